import { workspaceRoute } from '@/lib/http/route';
import { listPeople } from '@/lib/workspaces/list-people';

export const GET = workspaceRoute({}, ({ ctx }) => listPeople(ctx));
