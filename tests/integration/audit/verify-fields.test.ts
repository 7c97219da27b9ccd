import { randomUUID } from 'node:crypto';
import { Client } from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { verifyWorkspace } from '@/lib/audit/verify-workspace';
import { jobContext } from '@/lib/auth/context';
import { openThread } from '@/lib/review/open-thread';
import { settleThread } from '@/lib/review/settle-thread';
import { releaseRevision } from '@/lib/production/release-revision';
import { tartTray } from '@/db/seed/templates';
import {
  freshDatabase,
  freshObjectStore,
  freshSmtpCatcher,
  type FreshDatabase,
} from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';
import { startWorkerProcess } from '../jobs/worker-process';
import { postFile, settledJob, sign, waiveFailing } from '../production/agreed-template';

/**
 * A superuser who switches the guards off changes one field at a time, in every table that holds what was
 * agreed; the verifier must notice each. The columns are read from the catalogue, so that a new one counts.
 */
const frozen = [
  'audit_entries',
  'audit_heads',
  'check_runs',
  'findings',
  'gates',
  'locks',
  'meshes',
  'notes',
  'packs',
  'placements',
  'recipes',
  'releases',
  'reports',
  'revisions',
  'signatures',
  'threads',
  'waivers',
];

/** Not part of what was agreed, each for a reason. */
const outside = new Set([
  'revisions.state_at', // moves with each step of its life; the entry of the step has its own time
  'revisions.version', // a counter for editors
]);

let database: FreshDatabase;
let house: House;
let superuser: Client;

const verify = (objects = false) => verifyWorkspace(jobContext(house.workspace.id), { objects });
const text = (value: string) => ({
  type: 'doc',
  content: [{ type: 'paragraph', content: [{ type: 'text', text: value }] }],
});

beforeAll(async () => {
  database = await freshDatabase();
  await freshObjectStore();
  await freshSmtpCatcher();
  house = await makeHouse(database);
  await startWorkerProcess();
  const bytes = await tartTray({ draftDeg: 1, ventMm: 1 });
  const { revisionId } = await postFile(database, house, { fileName: 'tray.stl', bytes });
  await settledJob(database, revisionId);
  const approver = await house.enter('approver');
  const thread = await openThread(approver, revisionId, {
    clientKey: randomUUID(),
    body: text('Is the rim wide enough?'),
    findingId: null,
    pin: null,
    mustSettle: true,
  });
  await settleThread(approver, thread.id, { settled: true, version: thread.version });
  await waiveFailing(await house.enter('lead'), revisionId);
  await sign(await house.enter('lead'), revisionId);
  // Joins the docket between two signatures: the first one stands on an earlier content.
  await openThread(approver, revisionId, {
    clientKey: randomUUID(),
    body: text('For the next batch we would like a lower cup.'),
    findingId: null,
    pin: null,
    mustSettle: false,
  });
  await sign(approver, revisionId);
  const { id } = await releaseRevision(await house.enter('producer'), revisionId, { note: 'Run of ten.' });
  await settledJob(database, id);
  superuser = new Client({ connectionString: database.adminUrl });
  await superuser.connect();
  await superuser.query("set session_replication_role = 'replica'");
});

afterAll(() => superuser.end());

type Column = { table: string; column: string; type: string };

async function columns(): Promise<Column[]> {
  const { rows } = await database.query<Column>(
    `select table_name as "table", column_name as "column", data_type as type from information_schema.columns
     where table_schema = 'public' and table_name = any($1) and column_name <> 'workspace_id' order by 1, ordinal_position`,
    [frozen],
  );
  return rows;
}

/** Another value of the column's type. */
const another: Record<string, string> = {
  text: "coalesce(c, '') || 'x'",
  integer: 'coalesce(c, 0) + 1000',
  bigint: 'coalesce(c, 0) + 1000',
  'double precision': 'coalesce(c, 0) + 1000',
  boolean: 'not c',
  uuid: 'gen_random_uuid()',
  date: 'coalesce(c, current_date) + 1',
  'timestamp with time zone': "coalesce(c, now()) + interval '1 second'",
  jsonb:
    "case jsonb_typeof(c) when 'array' then c || '[1]'::jsonb when 'object' then c || '{\"added\": 1}'::jsonb else '{\"added\": 1}'::jsonb end",
};

describe('a superuser’s change', () => {
  it('is none at first', async () => {
    const verdict = await verify(true);
    expect(verdict.faults).toEqual([]);
    expect(verdict).toMatchObject({ revisions: 1, objects: 2 });
  });

  it('finds signatures on two contents, and the pack has both', async () => {
    const { rows: signed } = await database.query<{ content_digest: string }>(
      'select content_digest from signatures order by signed_at',
    );
    const [first, last] = signed.map(({ content_digest }) => content_digest);
    expect(first).not.toBe(last);
    const { rows } = await database.query<{ files: { name: string; sha256: string }[] }>(
      'select files from packs',
    );
    const sums = new Map(rows[0].files.map(({ name, sha256 }) => [name, sha256]));
    expect(sums.get('content.json')).toBe(last);
    expect(sums.get(`content-as-signed-${first.slice(0, 12)}.json`)).toBe(first);
  });

  it('is noticed in every field of every frozen table', async () => {
    const unnoticed: string[] = [];
    for (const { table, column, type } of await columns()) {
      if (outside.has(`${table}.${column}`)) continue;
      const { rows } = await superuser.query(
        `select ctid, "${column}"::text as was from ${table} order by ctid limit 1`,
      );
      expect(rows, `${table} has a row`).toHaveLength(1);
      const value = another[type].replaceAll(/\bc\b/g, `"${column}"`);
      const changed = await superuser.query(
        `update ${table} set "${column}" = ${value} where ctid = $1 returning ctid`,
        [rows[0].ctid],
      );
      const { faults } = await verify();
      if (faults.length === 0) unnoticed.push(`${table}.${column}`);
      await superuser.query(`update ${table} set "${column}" = $1::text::${type} where ctid = $2`, [
        rows[0].was,
        changed.rows[0].ctid,
      ]);
    }
    expect(unnoticed).toEqual([]);
    expect((await verify(true)).faults).toEqual([]);
  }, 300_000);
});
