import { json, studioRoute } from '@/lib/http/route';
import { createWorkspace } from '@/lib/workspaces/create-workspace';
import { listWorkspaces } from '@/lib/workspaces/list-workspaces';
import { CreateWorkspaceInput } from '@/lib/workspaces/schemas';

export const GET = studioRoute({}, ({ ctx }) => listWorkspaces(ctx));
export const POST = studioRoute({ body: CreateWorkspaceInput }, async ({ ctx, body }) =>
  json(await createWorkspace(ctx, body), 201),
);
