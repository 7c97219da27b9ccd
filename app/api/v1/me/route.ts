import { personRoute } from '@/lib/http/route';
import { myMemberships } from '@/lib/workspaces/my-memberships';
import { UpdateMeInput } from '@/lib/workspaces/schemas';
import { updateMe } from '@/lib/workspaces/update-me';

export const GET = personRoute({}, ({ ctx }) => myMemberships(ctx));
export const PATCH = personRoute({ body: UpdateMeInput }, ({ ctx, body }) => updateMe(ctx, body));
