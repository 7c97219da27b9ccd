import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { SettleInput } from '@/lib/review/schemas';
import { settleThread } from '@/lib/review/settle-thread';

const params = z.object({ thread: z.string() });

export const PATCH = workspaceRoute({ params, body: SettleInput }, ({ ctx, params: { thread }, body }) =>
  settleThread(ctx, thread, body),
);
