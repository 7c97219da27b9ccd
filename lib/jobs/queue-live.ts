import { uuidv7 } from 'uuidv7';
import type { TenantTx } from '@/db/tenant';
import { workspaceIdOf, type JobContext, type WorkspaceContext } from '@/lib/auth/context';
import { personChannel, workspaceChannel } from '@/realtime/channels';
import { readLiveEvent, type LiveEvent } from '@/realtime/events';
import { insertOutbox } from './outbox-data';

/** Tells everybody in the workspace, after commit, that something changed. */
export async function queueLive(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  ...events: LiveEvent[]
): Promise<void> {
  const workspaceId = workspaceIdOf(ctx);
  await insertOutbox(
    tx,
    events.map((event) => row(workspaceId, workspaceChannel(workspaceId), event)),
  );
}

/** Tells single people, e.g. that their Today changed. */
export async function queueLiveToPeople(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  personIds: string[],
  event: LiveEvent,
): Promise<void> {
  await insertOutbox(
    tx,
    personIds.map((id) => row(workspaceIdOf(ctx), personChannel(id), event)),
  );
}

function row(workspaceId: string, channel: string, event: LiveEvent) {
  const checked = readLiveEvent(event.name, event.data);
  if (!checked) throw new Error(`The live event "${event.name}" does not carry what it should.`);
  return {
    workspaceId,
    kind: 'live' as const,
    payload: { channel, ...checked },
    dedupeKey: uuidv7(),
  };
}
