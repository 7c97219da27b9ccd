import { existsSync, readdirSync, readlinkSync } from 'node:fs';
import path from 'node:path';
import { createTransport } from 'nodemailer';
import { Client } from 'pg';
import { describe, expect, it } from 'vitest';
import { sourceDigest } from '@/docker/local/build-app';
import { root } from '@/docker/local/folders';
import { crashService, mailTo, product, startService, stopService } from '../../support/product';
import { visitor } from '../../support/browser';

const { baseUrl, storeUrl, adminUrl, workerEnv, people } = product();

async function workerConnections(): Promise<number[]> {
  const client = new Client({ connectionString: adminUrl });
  await client.connect();
  const { rows } = await client.query<{ pid: number }>(
    "select pid from pg_stat_activity where application_name = 'firstpull-listen'",
  );
  await client.end();
  return rows.map(({ pid }) => pid);
}

describe('the product as npm start brings it up', () => {
  it('shows a page in a browser, without an error', async () => {
    const { page, problems, context } = await visitor();
    const response = await page.goto('/');
    expect(response?.status()).toBe(200);
    await expect.poll(() => page.title()).not.toBe('');
    expect(problems).toEqual([]);
    await context.close();
  });

  it('has people who can sign in, each with an address that leads nowhere', () => {
    expect(people.length).toBeGreaterThan(1);
    expect(people.filter(({ email }) => !email.endsWith('.example'))).toEqual([]);
  });

  it('catches mail and shows it', async () => {
    const transport = createTransport(workerEnv.SMTP_URL);
    const [from, to] = ['no-reply@firstpull.example', 'trial@nowhere.example'];
    await transport.sendMail({ from, to, subject: 'Trial', text: 'It came.' });
    expect((await mailTo(to, ({ subject }) => subject === 'Trial')).text).toContain('It came.');
  });

  it('runs from a release that stands alone: no link in it leads out of it', () => {
    const release = path.join(root, '.next-release', sourceDigest().slice(0, 16));
    const links = readdirSync(release, { recursive: true, withFileTypes: true }).filter((one) =>
      one.isSymbolicLink(),
    );
    const targets = links.map((one) =>
      path.resolve(one.parentPath, readlinkSync(path.join(one.parentPath, one.name))),
    );
    expect(targets.length).toBeGreaterThan(0);
    expect(targets.filter((target) => !target.startsWith(`${release}/`) || !existsSync(target))).toEqual([]);
  });

  it('lets nobody read the store unsigned', async () => {
    expect((await fetch(`${storeUrl}/${workerEnv.S3_BUCKET}?list-type=2`)).status).toBe(403);
  });

  it('brings a killed worker back', async () => {
    await expect.poll(workerConnections, { timeout: 20_000 }).toHaveLength(1);
    const [before] = await workerConnections();
    await crashService('worker');
    const isAnother = async () => (await workerConnections()).some((pid) => pid !== before);
    await expect.poll(isAnother, { timeout: 30_000 }).toBe(true);
  });

  it('stays up without the realtime server, which can go and come', async () => {
    const ready = `http://${workerEnv.PUSHER_HOST}:${workerEnv.PUSHER_PORT}/ready`;
    await stopService('realtime');
    await expect(fetch(ready)).rejects.toThrow();
    expect((await fetch(`${baseUrl}/api/live`)).status).toBe(200);
    await startService('realtime');
    expect((await fetch(ready)).status).toBe(200);
  });
});
