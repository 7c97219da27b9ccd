import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { Client } from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { typescriptCommand } from '@/docker/local/node-command';
import { releaseRevision } from '@/lib/production/release-revision';
import {
  freshDatabase,
  freshObjectStore,
  freshSmtpCatcher,
  type FreshDatabase,
} from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';
import type { ObjectStore } from '@/tests/support/object-store/start-object-store';
import { startWorkerProcess } from '../jobs/worker-process';
import { approvedTemplate, settledJob } from '../production/agreed-template';

const root = path.resolve(import.meta.dirname, '../../..');
let database: FreshDatabase;
let objects: ObjectStore;
let house: House;
let quiet: House;
let folder: string;
let superuser: Client;

beforeAll(async () => {
  database = await freshDatabase();
  objects = await freshObjectStore();
  await freshSmtpCatcher();
  house = await makeHouse(database);
  quiet = await makeHouse(database);
  await startWorkerProcess();
  const { revisionId } = await approvedTemplate(database, house);
  const { id } = await releaseRevision(await house.enter('producer'), revisionId, { note: '' });
  await settledJob(database, id);
  folder = await mkdtemp(path.join(tmpdir(), 'firstpull-audit-test-'));
  superuser = new Client({ connectionString: database.adminUrl });
  await superuser.connect();
  await superuser.query("set session_replication_role = 'replica'");
});
afterAll(async () => {
  await superuser.end();
  await rm(folder, { recursive: true, force: true });
});

/** The command as a person runs it. */
function verify(...args: string[]): Promise<{ code: number; out: string; err: string }> {
  const [program, ...rest] = typescriptCommand(path.join(root, 'lib/audit/verify-command.ts'), ...args);
  return new Promise((resolve) =>
    execFile(program, rest, { cwd: root, env: process.env }, (error, out, err) =>
      resolve({ code: error ? Number(error.code) : 0, out, err }),
    ),
  );
}

describe('audit:verify', { timeout: 120_000 }, () => {
  it('finds everything as it was written, and says what it looked at', async () => {
    const { code, out } = await verify('--objects');
    expect(out).toMatch(
      new RegExp(
        `good {2}${house.workspace.slug} .* \\d+ entries, 1 locked revisions, 2 files, head [0-9a-f]{64}`,
      ),
    );
    expect(out).toMatch(new RegExp(`good {2}${quiet.workspace.slug} `));
    expect(out).toContain('Everything is as it was written.');
    expect(code).toBe(0);
  });

  it('names the first bad entry, the workspace, and ends with 1', async () => {
    await superuser.query(
      "update audit_entries set actor_name = 'Nobody' where workspace_id = $1 and seq = 5",
      [house.workspace.id],
    );
    const { code, out } = await verify();
    await superuser.query('update audit_entries set actor_name = $2 where workspace_id = $1 and seq = 5', [
      house.workspace.id,
      house.people.lead.person.name,
    ]);
    expect(out).toMatch(new RegExp(`BAD {3}${house.workspace.slug} `));
    expect(out).toContain('audit entry 5: ');
    expect(out).toMatch(new RegExp(`good {2}${quiet.workspace.slug} `));
    expect(code).toBe(1);
  });

  it('reads the bytes in the store when asked', async () => {
    const { rows } = await database.query<{ store_key: string }>('select store_key from meshes');
    const stored = objects.object(rows[0].store_key)!;
    const honest = stored.body!;
    stored.body = Buffer.from(honest).fill(9, 200, 201);
    const without = await verify('--workspace', house.workspace.slug);
    const withBytes = await verify('--workspace', house.workspace.slug, '--objects');
    stored.body = honest;
    expect(without.code).toBe(0);
    expect(withBytes.out).toContain('has other bytes in the store than were agreed');
    expect(withBytes.code).toBe(1);
  });

  it('finds a chain that was cut together with its head, by heads that were kept elsewhere', async () => {
    const heads = path.join(folder, 'heads.json');
    expect((await verify('--heads', heads)).code).toBe(0);
    expect(Object.keys(JSON.parse(await readFile(heads, 'utf8')).heads)).toHaveLength(2);
    expect((await verify('--against', heads)).code).toBe(0);

    const cut = 'delete from audit_entries where workspace_id = $1 and seq > 2 returning *';
    const { rows } = await superuser.query(cut, [quiet.workspace.id]);
    expect(rows.length).toBeGreaterThan(0);
    await superuser.query(
      `update audit_heads h set seq = e.seq, hash = e.hash from audit_entries e
       where e.workspace_id = h.workspace_id and e.seq = 2 and h.workspace_id = $1`,
      [quiet.workspace.id],
    );
    expect((await verify('--workspace', quiet.workspace.slug)).code).toBe(0);
    const { code, out } = await verify('--against', heads);
    expect(out).toMatch(/the chain was cut or rewritten/);
    expect(code).toBe(1);
  });

  it('says what is wrong with what it was given, and ends with 2', async () => {
    const broken = path.join(folder, 'broken.json');
    await writeFile(broken, '{}');
    expect(await verify('--against', broken)).toMatchObject({
      code: 2,
      err: expect.stringContaining(broken),
    });
    expect(await verify('--workspace', 'nowhere')).toMatchObject({ code: 2 });
    expect(await verify('--unknown')).toMatchObject({ code: 2 });
  });
});
