import { publicRoute } from '@/lib/http/route';
import { readInvitation } from '@/lib/workspaces/read-invitation';
import { TokenParams } from '@/lib/workspaces/schemas';

/** `[invitation]` is the token of the mailed link, not the invitation's id. */
export const GET = publicRoute({ params: TokenParams }, ({ params }) => readInvitation(params.invitation));
