import { z } from 'zod';
import { json, workspaceRoute } from '@/lib/http/route';
import { openThread } from '@/lib/review/open-thread';
import { OpenThreadInput } from '@/lib/review/schemas';

const params = z.object({ revision: z.string() });

export const POST = workspaceRoute(
  { params, body: OpenThreadInput, idempotent: true },
  async ({ ctx, params: { revision }, body }) => json(await openThread(ctx, revision, body), 201),
);
