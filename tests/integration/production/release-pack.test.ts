import { execFile } from 'node:child_process';
import { mkdtemp, readFile, readdir, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import JSZip from 'jszip';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { GET } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/pack/route';
import { POST } from '@/app/api/v1/workspaces/[workspace]/revisions/[revision]/release/route';
import { canonical, sha256 } from '@/lib/audit/canonical';
import { callRoute } from '@/tests/support/call-route';
import {
  freshDatabase,
  freshObjectStore,
  freshSmtpCatcher,
  type FreshDatabase,
} from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';
import type { ObjectStore } from '@/tests/support/object-store/start-object-store';
import type { SmtpCatcher } from '@/tests/support/smtp-catcher';
import { startWorkerProcess } from '../jobs/worker-process';
import { pdfPages } from './pdf-pages';
import { approvedTemplate, settledJob, type Posted } from './agreed-template';

const run = promisify(execFile);
const fileName = 'Törtchen tray (six).stl';

let database: FreshDatabase;
let objects: ObjectStore;
let mail: SmtpCatcher;
let house: House;
let posted: Posted;
let releaseId: string;
let zip: Buffer;
let folder: string;

beforeAll(async () => {
  database = await freshDatabase();
  objects = await freshObjectStore();
  mail = await freshSmtpCatcher();
  house = await makeHouse(database);
  await startWorkerProcess();
  posted = await approvedTemplate(database, house, fileName);
  const answer = await callRoute(POST, {
    params: { workspace: house.workspace.slug, revision: posted.revisionId },
    cookie: house.people.producer.cookie,
    body: { note: 'First run of two hundred.' },
    headers: { 'idempotency-key': 'release-once' },
  });
  expect(answer.status).toBe(201);
  ({ id: releaseId } = await answer.json());
  const job = await settledJob(database, releaseId);
  expect(job).toMatchObject({ state: 'done', error: null });
  folder = await mkdtemp(path.join(tmpdir(), 'firstpull-pack-test-'));
});

afterAll(() => rm(folder, { recursive: true, force: true }));

const params = () => ({ workspace: house.workspace.slug, revision: posted.revisionId });

describe('the release pack', () => {
  it('is reached by a redirect to a short-lived address of the store', async () => {
    const answer = await callRoute(GET, { params: params(), cookie: house.people.producer.cookie });
    expect(answer.status).toBe(307);
    const location = new URL(answer.headers.get('location')!);
    expect(Number(location.searchParams.get('X-Amz-Expires'))).toBeLessThanOrEqual(300);
    const download = await fetch(location);
    expect(download.status).toBe(200);
    expect(download.headers.get('content-disposition')).toContain('AAC-001-A-release-pack.zip'.slice(3));
    zip = Buffer.from(await download.arrayBuffer());
    const { rows } = await database.query<{ sha256: string; bytes: number }>(
      'select sha256, bytes from packs',
    );
    expect(rows).toEqual([{ sha256: sha256(zip), bytes: zip.length }]);
  });

  it('unpacks to files whose sums verify with sha256sum, the mesh byte for byte as posted', async () => {
    const archive = await JSZip.loadAsync(zip);
    for (const entry of Object.values(archive.files)) {
      expect(entry.name).not.toMatch(/[/\\]/);
      await writeFile(path.join(folder, entry.name), await entry.async('nodebuffer'));
    }
    const names = await readdir(folder);
    expect(names.sort()).toEqual(
      [
        'README.txt',
        'SHA256SUMS',
        fileName,
        'certificate.pdf',
        'check-pack.mjs',
        'content.json',
        'docket.json',
        'recipe.json',
        'report.json',
        'signatures.json',
      ].sort(),
    );
    expect((await readFile(path.join(folder, fileName))).equals(Buffer.from(posted.bytes))).toBe(true);
    const { stdout } = await run('sha256sum', ['--strict', '-c', 'SHA256SUMS'], { cwd: folder });
    expect(stdout.trim().split('\n')).toHaveLength(names.length - 1);
    expect(stdout).not.toMatch(/FAILED/);
  });

  it('proves the signed digest from content.json alone', async () => {
    const text = await readFile(path.join(folder, 'content.json'), 'utf8');
    const signatures = JSON.parse(await readFile(path.join(folder, 'signatures.json'), 'utf8'));
    const content = JSON.parse(text);
    expect(canonical(content)).toBe(text);
    expect(sha256(text)).toBe(signatures.contentDigest);
    expect(content.mesh).toMatchObject({ sha256: sha256(posted.bytes), bytes: posted.bytes.length });
    expect(sha256(canonical(JSON.parse(await readFile(path.join(folder, 'report.json'), 'utf8'))))).toBe(
      content.report.sha256,
    );
    expect(sha256(canonical(JSON.parse(await readFile(path.join(folder, 'recipe.json'), 'utf8'))))).toBe(
      content.recipeDigest,
    );
    expect(signatures.signatures.map((one: { gate: string }) => one.gate)).toEqual(['Studio', 'Client']);
    for (const one of signatures.signatures)
      expect(one).toMatchObject({
        decision: 'sign',
        contentDigest: signatures.contentDigest,
        content: 'content.json',
      });
  });

  it('checks itself with the script inside, and names whatever was changed', async () => {
    const { contentDigest } = JSON.parse(await readFile(path.join(folder, 'signatures.json'), 'utf8'));
    const check = (...given: string[]) =>
      run(process.execPath, [path.join(folder, 'check-pack.mjs'), ...given], { cwd: tmpdir() }).then(
        ({ stdout }) => ({ code: 0, stdout }),
        ({ code, stdout }: { code: number; stdout: string }) => ({ code, stdout }),
      );
    const whole = await check(contentDigest);
    expect(whole).toEqual({
      code: 0,
      stdout: expect.stringContaining(`All 9 files are as they were packed.`),
    });
    expect(whole.stdout).toContain(contentDigest);
    expect((await check('0'.repeat(64))).stdout).toContain('not the one that you were handed');

    const kept = async (name: string) => ({ name, bytes: await readFile(path.join(folder, name)) });
    const restore = ({ name, bytes }: { name: string; bytes: Buffer }) =>
      writeFile(path.join(folder, name), bytes);
    const sums = await kept('SHA256SUMS');
    const names = sums.bytes
      .toString()
      .trim()
      .split('\n')
      .map((line) => line.slice(66));
    for (const name of names) {
      const file = await kept(name);
      const changed = Buffer.from(file.bytes);
      // The script itself gets a line more: with a byte flipped it might not run at all.
      if (name === 'check-pack.mjs')
        await restore({ name, bytes: Buffer.concat([changed, Buffer.from('\n')]) });
      else {
        changed[changed.length >> 1] ^= 1;
        await restore({ name, bytes: changed });
      }
      const found = await check();
      expect(found, name).toMatchObject({ code: 1, stdout: expect.stringContaining(`${name}: was changed`) });
      if (name !== 'check-pack.mjs') {
        await rm(path.join(folder, name));
        expect((await check()).stdout).toContain(`${name}: is missing`);
      }
      await restore(file);
    }

    // Somebody who also makes the sums anew is found by the signed digest.
    const forge = async (name: string, change: (text: string) => string) => {
      const file = await kept(name);
      const text = change(file.bytes.toString());
      expect(text).not.toBe(file.bytes.toString());
      await restore({ name, bytes: Buffer.from(text) });
      await restore({
        name: 'SHA256SUMS',
        bytes: Buffer.from(sums.bytes.toString().replace(sha256(file.bytes), sha256(text))),
      });
      const found = await check(contentDigest);
      await restore(file);
      await restore(sums);
      return found;
    };
    const not = (name: string) => ({
      code: 1,
      stdout: expect.stringContaining(`${name}: is not what was signed`),
    });
    expect(await forge('docket.json', (text) => text.replace('"status": "', '"status": "not '))).toEqual(
      not('docket.json'),
    );
    expect(await forge('report.json', (text) => text.replace('"measured": ', '"measured": 1'))).toEqual(
      not('report.json'),
    );
    expect(await forge('recipe.json', (text) => text.replace('"gaugeMm": ', '"gaugeMm": 1'))).toEqual(
      not('recipe.json'),
    );
    expect(
      (await forge('content.json', (text) => text.replace('"fileName"', '"fileNam3"'))).stdout,
    ).toContain('content.json: is not what');
    await writeFile(path.join(folder, 'extra.stl'), 'solid');
    expect((await check()).stdout).toContain('extra.stl: does not belong to the pack');
    await rm(path.join(folder, 'extra.stl'));
    await writeFile(path.join(folder, '.DS_Store'), '');
    expect((await check()).code).toBe(0);
    await rm(path.join(folder, '.DS_Store'));
  });

  it('holds a certificate that names signers, meanings, times with zone and digest, and the cautions', async () => {
    const pages = await pdfPages(path.join(folder, 'certificate.pdf'));
    const text = pages.join(' ').replace(/\s+/g, ' ');
    expect(pages.map((page) => page.match(/Sheet \d of \d/)?.[0])).toEqual(
      pages.map((_, index) => `Sheet ${index + 1} of ${pages.length}`),
    );
    const { rows } = await database.query<{ printed_name: string; meaning: string; content_digest: string }>(
      'select printed_name, meaning, content_digest from signatures',
    );
    expect(rows).toHaveLength(2);
    for (const { printed_name, meaning, content_digest } of rows) {
      expect(text).toContain(printed_name);
      expect(text).toContain(meaning);
      expect(text).toContain(content_digest);
    }
    expect(text).toMatch(/\d{1,2} \w{3} \d{4}, \d\d:\d\d:\d\d \w+ \(UTC[+-]\d\d:\d\d, Europe\/Lisbon\)/);
    expect(text).toContain('Europe/Lisbon');
    expect(text).toContain(sha256(posted.bytes));
    expect(text).toContain('test pull');
    expect(text).toContain('common practice, no source');
  });

  it('is told of by mail to everybody but the producer, with the cautions', async () => {
    const others = ['lead', 'designer', 'reviewer', 'approver'] as const;
    for (const role of others) {
      const got = await mail.next(
        ({ to, subject }) => to.includes(house.people[role].person.email) && subject.includes('is released'),
      );
      expect(got.text).toContain('First run of two hundred.');
      expect(got.text).toContain('Before anyone acts on it');
      expect(got.text).toContain(`/w/${house.workspace.slug}/`);
    }
    const told = mail.mails.filter(({ subject }) => subject.includes('is released'));
    expect(told).toHaveLength(others.length);
  });

  it('gives the same answer to the same request, and one release', async () => {
    const again = await callRoute(POST, {
      params: params(),
      cookie: house.people.producer.cookie,
      body: { note: 'First run of two hundred.' },
      headers: { 'idempotency-key': 'release-once' },
    });
    expect(again.status).toBe(201);
    expect((await again.json()).id).toBe(releaseId);
    const { rows } = await database.query('select id from releases');
    expect(rows).toHaveLength(1);
    expect(objects.keys().filter((key) => key.startsWith('packs/'))).toHaveLength(1);
  });
});
