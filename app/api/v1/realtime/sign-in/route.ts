import { readForm } from '@/lib/http/read-form';
import { parseInput } from '@/lib/http/read-input';
import { personRoute } from '@/lib/http/route';
import { authorizeSocket } from '@/lib/workspaces/authorize-channel';
import { SocketInput } from '@/lib/workspaces/schemas';

export const POST = personRoute({}, async ({ ctx, request }) =>
  authorizeSocket(ctx, parseInput(SocketInput, await readForm(request)).socket_id),
);
