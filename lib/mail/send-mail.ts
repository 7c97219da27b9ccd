import nodemailer from 'nodemailer';
import { mailEnv, siteEnv } from '@/lib/env/env';
import { messageId, threadRoot } from './message-id';
import type { MailRequest } from './messages';
import { renderMail } from './render/render-mail';

function open() {
  return nodemailer.createTransport({
    url: mailEnv().SMTP_URL,
    pool: true,
    maxConnections: 4,
    connectionTimeout: 5_000,
    greetingTimeout: 5_000,
    socketTimeout: 15_000,
    disableFileAccess: true,
    disableUrlAccess: true,
  } as never);
}
let transport: ReturnType<typeof open> | undefined;

/** Renders and sends one mail. Rejects with nodemailer's error; `isRefusal` tells whether trying again is of use. */
export async function sendMail(request: MailRequest, dedupeKey: string): Promise<void> {
  const origin = siteEnv().APP_URL;
  const host = new URL(origin).hostname;
  const root = threadRoot(request, host);
  transport ??= open();
  await transport.sendMail({
    ...renderMail(request, origin),
    from: mailEnv().MAIL_FROM,
    to: { name: request.to.name, address: request.to.email },
    messageId: messageId(dedupeKey, host),
    ...(root ? { inReplyTo: root, references: [root] } : {}),
    headers: {
      // RFC 3834: no automatic answers to these, please.
      'Auto-Submitted': 'auto-generated',
      'X-Auto-Response-Suppress': 'All',
    },
  });
}

export function closeMail(): void {
  transport?.close();
  transport = undefined;
}

/**
 * Whether the mail server refused this recipient or this mail for good (5xx after RCPT TO or DATA). A refusal
 * of the connection, the login or the sender concerns every mail and may be mended: those are tried again.
 */
export function isRefusal(error: unknown): boolean {
  const { responseCode, command } = error as { responseCode?: number; command?: string };
  return responseCode !== undefined && responseCode >= 500 && (command === 'RCPT TO' || command === 'DATA');
}
