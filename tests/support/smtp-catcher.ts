import { simpleParser, type ParsedMail } from 'mailparser';
import { SMTPServer } from 'smtp-server';

export interface CaughtMail {
  from: string;
  to: string[];
  subject: string;
  text: string;
  html: string;
  /** The whole parsed message, for headers and attachments. */
  parsed: ParsedMail;
}

export interface SmtpCatcher {
  /** The variables of lib/env that lead to it. */
  env: Record<string, string>;
  /** All mails so far, oldest first. */
  mails: CaughtMail[];
  /** Resolves with the first mail that matches, caught already or yet to come. */
  next(match: (mail: CaughtMail) => boolean, withinMs?: number): Promise<CaughtMail>;
  /** From now on every mail is refused with this code (such as 451 or 550), until it is set to null. */
  refuseWith(code: number | null): void;
  stop(): Promise<void>;
}

/** A mail server on loopback that keeps what it gets; for tests. */
export async function startSmtpCatcher(): Promise<SmtpCatcher> {
  const mails: CaughtMail[] = [];
  const waiting = new Set<() => void>();
  let refusal: number | null = null;
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    logger: false,
    onData(stream, session, done) {
      simpleParser(stream)
        .then((parsed) => {
          if (refusal !== null)
            return done(Object.assign(new Error('refused by the test'), { responseCode: refusal }));
          mails.push({
            from: parsed.from?.value[0]?.address ?? '',
            to: session.envelope.rcptTo.map(({ address }) => address),
            subject: parsed.subject ?? '',
            text: parsed.text ?? '',
            html: parsed.html || '',
            parsed,
          });
          done();
          waiting.forEach((wake) => wake());
        })
        .catch((error: Error) => done(error));
    },
  });
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(0, '127.0.0.1', resolve);
  });
  // A client that breaks off is no failure of the catcher.
  server.on('error', () => undefined);
  const { port } = server.server.address() as { port: number };
  return {
    env: { SMTP_URL: `smtp://127.0.0.1:${port}`, MAIL_FROM: 'Firstpull <no-reply@firstpull.example>' },
    mails,
    refuseWith: (code) => (refusal = code),
    next: (match, withinMs = 15_000) =>
      new Promise((resolve, reject) => {
        const timer = setTimeout(() => {
          waiting.delete(look);
          const seen = mails.map(({ to, subject }) => `${to.join(', ')}: ${subject}`).join('\n  ');
          reject(new Error(`No such mail within ${withinMs} ms. Caught so far:\n  ${seen || 'none'}`));
        }, withinMs);
        const look = () => {
          const found = mails.find(match);
          if (!found) return;
          clearTimeout(timer);
          waiting.delete(look);
          resolve(found);
        };
        waiting.add(look);
        look();
      }),
    stop: () => new Promise((resolve) => server.close(() => resolve())),
  };
}
