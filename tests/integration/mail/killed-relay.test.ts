import { createServer, type Server } from 'node:net';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { queueIdentityMail } from '@/lib/auth/auth-data';
import { messageId } from '@/lib/mail/message-id';
import { freshDatabase, freshSmtpCatcher, type FreshDatabase } from '@/tests/support/database';
import type { SmtpCatcher } from '@/tests/support/smtp-catcher';
import { startWorkerProcess } from '../jobs/worker-process';

let database: FreshDatabase;
let mail: SmtpCatcher;
/** Takes calls and never says a word, as a server does that hangs. */
let silent: Server;
let called: Promise<void>;

beforeAll(async () => {
  database = await freshDatabase();
  mail = await freshSmtpCatcher();
  silent = createServer();
  called = new Promise((resolve) => silent.once('connection', () => resolve()));
  await new Promise<void>((resolve) => silent.listen(0, '127.0.0.1', resolve));
});
afterAll(() => silent.close());

describe('a worker that is killed while it sends a mail', { timeout: 120_000 }, () => {
  it('loses nothing: another sends it, once, under the id that it would have had', async () => {
    const { port } = silent.address() as { port: number };
    const first = await startWorkerProcess({ SMTP_URL: `smtp://127.0.0.1:${port}` });
    await queueIdentityMail({
      template: 'verify-address',
      to: { email: 'ada@example.test', name: 'Ada' },
      url: 'http://127.0.0.1:3000/api/auth/verify-email?token=t',
    });
    await called;
    await first.end('SIGKILL');
    const { rows } = await database.query<{ dedupe_key: string; attempts: number; sent_at: null }>(
      "select dedupe_key, attempts, sent_at from outbox where kind = 'mail'",
    );
    expect(rows).toMatchObject([{ attempts: 1, sent_at: null }]);

    // The time for which the first one had taken it goes by.
    await database.query('update outbox set due_at = now()');
    const second = await startWorkerProcess();
    const got = await mail.next(({ to }) => to.includes('ada@example.test'));
    expect(got.parsed.messageId).toBe(messageId(rows[0].dedupe_key, '127.0.0.1'));
    expect(await second.end('SIGTERM')).toEqual({ code: 0, signal: null });
    const { rows: after } = await database.query('select attempts, sent_at is not null as sent from outbox');
    expect(after).toEqual([{ attempts: 2, sent: true }]);
    expect(mail.mails).toHaveLength(1);
  });
});
