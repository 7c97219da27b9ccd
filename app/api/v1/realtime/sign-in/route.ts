import { sessionIdFromHeaders } from '@/lib/auth/session';
import { readForm } from '@/lib/http/read-form';
import { parseInput } from '@/lib/http/read-input';
import { personRoute } from '@/lib/http/route';
import { authorizeSocket } from '@/lib/workspaces/authorize-channel';
import { SocketInput } from '@/lib/workspaces/schemas';

export const POST = personRoute({}, async ({ request }) => {
  const { socket_id } = parseInput(SocketInput, await readForm(request));
  return authorizeSocket(await sessionIdFromHeaders(request.headers), socket_id);
});
