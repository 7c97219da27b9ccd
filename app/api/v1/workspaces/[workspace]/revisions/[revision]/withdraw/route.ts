import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { ReasonInput } from '@/lib/review/schemas';
import { withdrawRevision } from '@/lib/review/withdraw-revision';

const params = z.object({ revision: z.string() });

export const POST = workspaceRoute({ params, body: ReasonInput }, ({ ctx, params: { revision }, body }) =>
  withdrawRevision(ctx, revision, body),
);
