import { inject } from 'vitest';

export type ServiceName = 'database' | 'store' | 'mail' | 'realtime' | 'worker' | 'app';

/** The running product: addresses, people, database. */
export const product = () => inject('product');

/** Kills a service hard, as a crash would; the supervisor starts it again by itself. */
export const crashService = (name: ServiceName) => control(name, 'crash');

/** Stops a service and leaves it down until `startService`. */
export const stopService = (name: ServiceName) => control(name, 'stop');

/** Starts a stopped service; resolves when it answers. */
export const startService = (name: ServiceName) => control(name, 'start');

async function control(name: ServiceName, action: string): Promise<void> {
  const response = await fetch(`${inject('product').controlUrl}/${name}/${action}`, { method: 'POST' });
  if (!response.ok)
    throw new Error(`The ${name} did not ${action}: ${response.status} ${await response.text()}`);
}

export interface InboxMail {
  id: string;
  to: string[];
  subject: string;
  text: string;
  html: string;
}

/** The product's mails to one person, oldest first, from the catcher's own page. */
export async function mailsTo(address: string): Promise<InboxMail[]> {
  const response = await fetch(`${inject('product').mailUrl}/api/email`);
  if (!response.ok) throw new Error(`The mail catcher answered ${response.status}.`);
  const all = (await response.json()) as {
    id: string;
    time: string;
    to: { address: string }[];
    subject: string;
    text?: string;
    html?: string;
  }[];
  return all
    .filter(({ to }) => to.some((one) => one.address === address))
    .sort((a, b) => Date.parse(a.time) - Date.parse(b.time))
    .map(({ id, to, subject, text, html }) => ({
      id,
      to: to.map((one) => one.address),
      subject,
      text: text ?? '',
      html: html ?? '',
    }));
}

/** Waits for a mail to one person that matches; rejects with what came instead. */
export async function mailTo(
  address: string,
  match: (mail: InboxMail) => boolean,
  withinMs = 30_000,
): Promise<InboxMail> {
  const deadline = Date.now() + withinMs;
  for (;;) {
    const mails = await mailsTo(address);
    const found = mails.findLast(match);
    if (found) return found;
    if (Date.now() > deadline) {
      const subjects = mails.map(({ subject }) => subject).join('; ');
      throw new Error(`No such mail to ${address} within ${withinMs} ms. There were: ${subjects || 'none'}`);
    }
    // The catcher only answers questions; this is how often it is asked, not how long a test waits.
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}
