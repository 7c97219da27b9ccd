import { withTenant } from '@/db/tenant';
import type { PersonContext } from '@/lib/auth/context';
import { enterWorkspace } from '@/lib/auth/enter';
import { AppError, forbidden } from '@/lib/errors/app-error';
import { signChannel, signSession, socketIdPattern } from '@/realtime/authorize';
import { parseChannel, type Channel } from '@/realtime/channels';
import { revisionExists } from './channel-data';

const refused = () => forbidden('You may not listen to this channel.', 'channel-refused');

/** Signs a subscription for a person who may listen now. Every refusal is the same, whatever its cause. */
export async function authorizeChannel(ctx: PersonContext, socketId: string, channelName: string) {
  const channel = parseChannel(channelName);
  if (!channel || !socketIdPattern.test(socketId) || socketId.length > 40) throw refused();
  if (!(await mayListen(ctx, channel))) throw refused();
  return signChannel(socketId, channelName, channel, ctx.person);
}

/** Says which session a socket belongs to, so that it ends with it, and with a membership of its person. */
export function authorizeSocket(sessionId: string | null, socketId: string) {
  if (!sessionId || !socketIdPattern.test(socketId) || socketId.length > 40) throw refused();
  return signSession(socketId, sessionId);
}

async function mayListen({ person }: PersonContext, channel: Channel): Promise<boolean> {
  if (channel.kind === 'person') return channel.personId === person.id;
  try {
    const ctx = await enterWorkspace(person, channel.workspaceId);
    if (channel.kind === 'workspace') return true;
    return await withTenant(ctx, (tx) => revisionExists(tx, ctx.workspace.id, channel.revisionId));
  } catch (error) {
    if (error instanceof AppError && error.code === 'not_found') return false;
    throw error;
  }
}
