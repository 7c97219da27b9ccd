import type { TenantTx } from '@/db/tenant';
import type { MailRequest } from '@/lib/mail/messages';
import { insertOutbox } from './outbox-data';

/**
 * Queues a mail in the caller's transaction. `dedupeKey` names the occasion (e.g. `revision-posted:<id>:<person>`):
 * the relay sends one mail a key, however often it tries.
 */
export async function queueMail(
  tx: TenantTx,
  home: { workspaceId: string } | { studioId: string },
  mails: { request: MailRequest; dedupeKey: string }[],
): Promise<void> {
  await insertOutbox(
    tx,
    mails.map(({ request, dedupeKey }) => ({
      ...home,
      kind: 'mail' as const,
      payload: request as never,
      dedupeKey,
    })),
  );
}
