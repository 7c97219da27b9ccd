import { findMembership, findPerson } from '@/lib/auth/auth-data';
import { log } from '@/lib/log/log';
import { mailRequest, type MailRequest } from '@/lib/mail/messages';
import { isRefusal, sendMail } from '@/lib/mail/send-mail';
import { backoffS } from './backoff';
import { markSent, markUnsendable, putOff, takeDue, type OutboxItem } from './outbox-relay-data';

const batch = 8;
/** Longer than a batch can take even when every mail runs into its time limit. */
const holdS = 180;
const giveUpMs = 24 * 3_600_000;

/** Sends due mails. Answers whether there may be more. */
export async function deliverMail(): Promise<boolean> {
  const items = await takeDue('mail', batch, holdS);
  const byRecipient: Record<string, OutboxItem[]> = {};
  for (const item of items)
    (byRecipient[JSON.stringify((item.payload as { to?: unknown }).to ?? null)] ??= []).push(item);
  await Promise.all(
    Object.values(byRecipient).map(async (queue) => {
      // One after another: a person reads them in the order in which things happened.
      for (const item of queue) await deliverOne(item);
    }),
  );
  return items.length === batch;
}

async function deliverOne(item: OutboxItem): Promise<void> {
  const parsed = mailRequest.safeParse(item.payload);
  if (!parsed.success) return markUnsendable([item.id], 'not a mail that this version knows');
  try {
    const request = await addressNow(parsed.data, item.workspaceId);
    if (!request) return await markUnsendable([item.id], 'the recipient is no longer a member');
    await sendMail(request, item.dedupeKey);
    await markSent([item.id]);
  } catch (error) {
    const answer = error instanceof Error ? error.message : String(error);
    const tooOld = Date.now() - item.createdAt.getTime() > giveUpMs;
    log().warn({ err: error, mail: item.id, attempt: item.attempts }, 'mail not sent');
    if (isRefusal(error)) return markUnsendable([item.id], `refused by the mail server: ${answer}`);
    if (tooOld) return markUnsendable([item.id], `given up after a day: ${answer}`);
    await putOff([item.id], backoffS(item.attempts, { firstS: 5, mostS: 180 }));
  }
}

/**
 * Membership and address as they are at this moment: whoever left a workspace gets no more of its mail,
 * and whoever changed their address gets it there. Null: not to be sent.
 */
async function addressNow(request: MailRequest, workspaceId: string | null): Promise<MailRequest | null> {
  if (!('personId' in request.to)) return request;
  if (!workspaceId || !(await findMembership(request.to.personId, workspaceId))) return null;
  const person = await findPerson(request.to.personId);
  if (!person) return null;
  return { ...request, to: { ...request.to, email: person.email, name: person.name } } as MailRequest;
}
