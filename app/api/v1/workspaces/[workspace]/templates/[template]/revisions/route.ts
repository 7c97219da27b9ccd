import { z } from 'zod';
import { json, workspaceRoute } from '@/lib/http/route';
import { listRevisions } from '@/lib/review/list-revisions';
import { postRevision } from '@/lib/review/post-revision';
import { PostRevisionInput } from '@/lib/review/schemas';

const params = z.object({ template: z.string() });

export const GET = workspaceRoute({ params }, ({ ctx, params: { template } }) =>
  listRevisions(ctx, template),
);

export const POST = workspaceRoute(
  { params, body: PostRevisionInput, idempotent: true },
  async ({ ctx, params: { template }, body }) => json(await postRevision(ctx, template, body), 201),
);
