import { workspaceRoute } from '@/lib/http/route';
import { listActivity } from '@/lib/review/list-activity';
import { ListActivityInput } from '@/lib/review/schemas';

export const GET = workspaceRoute({ query: ListActivityInput }, ({ ctx, query }) => listActivity(ctx, query));
