import { afterAll, afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import { withTenant } from '@/db/tenant';
import { jobContext } from '@/lib/auth/context';
import { queueIdentityMail } from '@/lib/auth/auth-data';
import { queueMail } from '@/lib/jobs/queue-mail';
import { pruneSent } from '@/lib/jobs/relay/outbox-relay-data';
import { startRelay, type Relay } from '@/lib/jobs/relay/start-relay';
import { messageId } from '@/lib/mail/message-id';
import { closeMail } from '@/lib/mail/send-mail';
import type { MailRequest } from '@/lib/mail/messages';
import { removeMember } from '@/lib/workspaces/remove-member';
import { freshDatabase, freshSmtpCatcher, type FreshDatabase } from '@/tests/support/database';
import { joinWorkspace, makeHouse, type House, type SignedIn } from '@/tests/support/make-house';
import type { SmtpCatcher } from '@/tests/support/smtp-catcher';

let database: FreshDatabase;
let mail: SmtpCatcher;
let house: House;
const relays: Relay[] = [];

beforeAll(async () => {
  database = await freshDatabase();
  mail = await freshSmtpCatcher();
  house = await makeHouse(database);
});
afterEach(async () => {
  mail.refuseWith(null);
  await Promise.all(relays.splice(0).map((relay) => relay.stop()));
});
afterAll(closeMail);

/** Relays listen in their process; here they are woken by hand. */
function relay(): Relay {
  const started = startRelay();
  relays.push(started);
  return started;
}

const note = (to: SignedIn, text: string): MailRequest => ({
  template: 'note-posted',
  to: { personId: to.person.id, email: to.person.email, name: to.person.name },
  workspaceId: house.workspace.id,
  workspaceName: house.workspace.name,
  number: 'AAA-001',
  title: 'Tart tray',
  letter: 'B',
  path: `/w/${house.workspace.slug}/templates/x/B`,
  authorName: 'Somebody',
  text,
  mentioned: false,
});
const queue = (...mails: { request: MailRequest; dedupeKey: string }[]) =>
  withTenant(jobContext(house.workspace.id), (tx) =>
    queueMail(tx, { workspaceId: house.workspace.id }, mails),
  );
const dueNow = () => database.query('update outbox set due_at = now() where sent_at is null');
type Row = {
  attempts: number;
  sent_at: Date | null;
  failure: string | null;
  payload: Record<string, unknown>;
};
const rowOf = async (dedupeKey: string) => {
  const { rows } = await database.query<Row>('select * from outbox where dedupe_key = $1', [dedupeKey]);
  expect(rows).toHaveLength(1);
  return rows[0];
};
const withText = (text: string) => mail.mails.filter((one) => one.text.includes(text));
const settled = (dedupeKey: string, look: (row: Row) => void) =>
  vi.waitFor(async () => look(await rowOf(dedupeKey)), { timeout: 20_000, interval: 50 });

describe('a mail in the outbox', () => {
  it('leaves after commit and not after a rollback', async () => {
    const { approver } = house.people;
    await queue({ request: note(approver, 'kept words'), dedupeKey: 'kept' });
    await expect(
      withTenant(jobContext(house.workspace.id), async (tx) => {
        await queueMail(tx, { workspaceId: house.workspace.id }, [
          { request: note(approver, 'taken back'), dedupeKey: 'lost' },
        ]);
        throw new Error('rolled back');
      }),
    ).rejects.toThrow('rolled back');
    relay();
    const got = await mail.next(({ text }) => text.includes('kept words'));
    expect(got.to).toEqual([approver.person.email]);
    expect(got.subject).toBe('AAA-001 B has a note by Somebody (Tart tray)');
    expect(got.parsed.headers.get('auto-submitted')).toBe('auto-generated');
    expect(got.parsed.references).toEqual(got.parsed.inReplyTo);
    expect(withText('taken back')).toEqual([]);
  });

  it('is one mail however often its occasion is queued', async () => {
    const request = note(house.people.lead, 'said once');
    await queue({ request, dedupeKey: 'occasion' }, { request, dedupeKey: 'occasion' });
    await queue({ request, dedupeKey: 'occasion' });
    relay();
    await settled('occasion', ({ sent_at }) => expect(sent_at).not.toBeNull());
    expect(withText('said once')).toHaveLength(1);
  });

  it('waits while the mail server is out of order, and leaves once when it is back, under the same id', async () => {
    mail.refuseWith(451);
    await queue({ request: note(house.people.lead, 'after the storm'), dedupeKey: 'storm' });
    const one = relay();
    await settled('storm', ({ attempts }) => expect(attempts).toBe(1));
    await dueNow();
    one.wake();
    await settled('storm', ({ attempts }) => expect(attempts).toBe(2));
    expect(await rowOf('storm')).toMatchObject({ sent_at: null, failure: null });
    mail.refuseWith(null);
    await vi.waitFor(async () => {
      await dueNow();
      one.wake();
      expect((await rowOf('storm')).sent_at).not.toBeNull();
    });
    expect(withText('after the storm')).toHaveLength(1);
    expect(withText('after the storm')[0].parsed.messageId).toBe(messageId('storm', '127.0.0.1'));
  });

  it('that is refused for good is kept with the reason and not tried again', async () => {
    mail.refuseWith(550);
    await queue({ request: note(house.people.lead, 'unwanted'), dedupeKey: 'refused' });
    const one = relay();
    await settled('refused', ({ failure }) => expect(failure).toMatch(/refused by the mail server.*550/));
    mail.refuseWith(null);
    await dueNow();
    one.wake();
    await queue({ request: note(house.people.lead, 'the next one'), dedupeKey: 'next' });
    one.wake();
    await settled('next', ({ sent_at }) => expect(sent_at).not.toBeNull());
    expect(await rowOf('refused')).toMatchObject({ attempts: 1, sent_at: null });
    expect(withText('unwanted')).toEqual([]);
  });

  it('does not reach whoever left the workspace meanwhile', async () => {
    const lead = await house.enter('lead');
    const leaver = await joinWorkspace(database, lead, 'reviewer');
    await queue({ request: note(leaver, 'not for leavers'), dedupeKey: 'leaver' });
    await removeMember(lead, leaver.person.id);
    relay();
    await settled('leaver', ({ failure }) => expect(failure).toBe('the recipient is no longer a member'));
    expect(withText('not for leavers')).toEqual([]);
  });

  it('goes to the address that a person has now', async () => {
    const { reviewer } = house.people;
    await queue({ request: note(reviewer, 'new address'), dedupeKey: 'moved' });
    await database.query('update users set email = $1 where id = $2', [
      'moved@example.test',
      reviewer.person.id,
    ]);
    relay();
    const got = await mail.next(({ text }) => text.includes('new address'));
    expect(got.to).toEqual(['moved@example.test']);
  });

  it('of identity keeps no way in once it was sent', async () => {
    const url = 'http://127.0.0.1:3000/api/auth/reset-password/secret-token';
    await queueIdentityMail({ template: 'reset-password', to: { email: 'a@example.test', name: 'A' }, url });
    relay();
    const got = await mail.next(({ text }) => text.includes('secret-token'));
    expect(got.text).toContain(url);
    await vi.waitFor(async () => {
      const { rows } = await database.query("select 1 from outbox where payload::text like '%secret-token%'");
      expect(rows).toEqual([]);
    });
  });
});

describe('several relays', () => {
  it('send each of a hundred mails once', async () => {
    const people = [house.people.lead, house.people.designer, house.people.producer, house.people.approver];
    const mails = Array.from({ length: 100 }, (_, n) => ({
      request: note(people[n % people.length], `number ${String(n).padStart(3, '0')} of the hundred`),
      dedupeKey: `hundred ${n}`,
    }));
    for (const one of mails) await queue(one);
    for (let n = 0; n < 3; n++) relay();
    await vi.waitFor(() => expect(withText('of the hundred')).toHaveLength(100), { timeout: 60_000 });
    const { rows } = await database.query<{ n: number }>(
      "select count(*)::int as n from outbox where dedupe_key like 'hundred %' and sent_at is not null and attempts = 1",
    );
    expect(rows[0].n).toBe(100);
    const subjects = new Set(withText('of the hundred').map(({ text }) => text.match(/number (\d+)/)![1]));
    expect(subjects.size).toBe(100);
  });

  it('throw out what was sent a week ago, and keep what was not', async () => {
    await database.query(
      "update outbox set sent_at = sent_at - interval '8 days' where dedupe_key like 'hundred %'",
    );
    await pruneSent();
    const { rows } = await database.query("select 1 from outbox where dedupe_key like 'hundred %'");
    expect(rows).toEqual([]);
    await rowOf('refused');
    await rowOf('kept');
  });
});
