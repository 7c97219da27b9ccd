import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { retireRevision } from '@/lib/production/retire-revision';
import { ReasonInput } from '@/lib/review/schemas';

export const POST = workspaceRoute(
  { params: z.object({ revision: z.string() }), body: ReasonInput },
  ({ ctx, params, body }) => retireRevision(ctx, params.revision, body),
);
