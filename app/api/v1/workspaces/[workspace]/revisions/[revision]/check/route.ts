import { z } from 'zod';
import { json, workspaceRoute } from '@/lib/http/route';
import { recheckRevision } from '@/lib/review/recheck-revision';

const params = z.object({ revision: z.string() });

/** Orders a check again that was given up. */
export const POST = workspaceRoute({ params }, async ({ ctx, params: { revision } }) =>
  json(await recheckRevision(ctx, revision), 202),
);
