import { api } from '../api-client';
import type { OutgoingNote } from './note-outbox';

/** Posts one note. The client key is the idempotency key too, so a repeated send answers the same. */
export async function sendNote(note: OutgoingNote): Promise<void> {
  const workspace = `/api/v1/workspaces/${note.workspaceId}`;
  const body = { clientKey: note.clientKey, body: note.body };
  if (note.threadId) {
    await api(`${workspace}/threads/${note.threadId}/notes`, { body, idempotencyKey: note.clientKey });
    return;
  }
  await api(`${workspace}/revisions/${note.revisionId}/threads`, {
    body: { ...body, findingId: note.findingId, pin: note.pin, mustSettle: note.mustSettle },
    idempotencyKey: note.clientKey,
  });
}
