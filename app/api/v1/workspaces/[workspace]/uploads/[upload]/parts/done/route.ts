import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { markPartDone } from '@/lib/review/mark-part-done';
import { PartDoneInput } from '@/lib/review/schemas';

const params = z.object({ upload: z.string() });

export const POST = workspaceRoute({ params, body: PartDoneInput }, ({ ctx, params: { upload }, body }) =>
  markPartDone(ctx, upload, body),
);
