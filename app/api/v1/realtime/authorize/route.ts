import { readForm } from '@/lib/http/read-form';
import { parseInput } from '@/lib/http/read-input';
import { personRoute } from '@/lib/http/route';
import { authorizeChannel } from '@/lib/workspaces/authorize-channel';
import { ChannelInput } from '@/lib/workspaces/schemas';

export const POST = personRoute({}, async ({ ctx, request }) => {
  const { socket_id, channel_name } = parseInput(ChannelInput, await readForm(request));
  return authorizeChannel(ctx, socket_id, channel_name);
});
