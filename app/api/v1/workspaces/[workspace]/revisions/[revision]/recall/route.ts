import { z } from 'zod';
import { workspaceRoute } from '@/lib/http/route';
import { recallRevision } from '@/lib/production/recall-revision';
import { ReasonInput } from '@/lib/review/schemas';

export const POST = workspaceRoute(
  { params: z.object({ revision: z.string() }), body: ReasonInput },
  ({ ctx, params, body }) => recallRevision(ctx, params.revision, body),
);
