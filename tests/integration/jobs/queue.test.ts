import { uuidv7 } from 'uuidv7';
import { beforeAll, describe, expect, it } from 'vitest';
import { withTenant } from '@/db/tenant';
import { jobContext } from '@/lib/auth/context';
import { enqueueJob } from '@/lib/jobs/enqueue-job';
import { holdsJob } from '@/lib/jobs/fence';
import {
  claimJob,
  markCancelled,
  markDone,
  markQueued,
  renewLease,
  writeProgress,
  type JobRow,
} from '@/lib/jobs/jobs-data';
import { sweepJobs } from '@/lib/jobs/sweep-jobs';
import { freshDatabase, type FreshDatabase } from '@/tests/support/database';
import { makeHouse, type House } from '@/tests/support/make-house';

let database: FreshDatabase;
let house: House;

beforeAll(async () => {
  database = await freshDatabase();
  house = await makeHouse(database);
});

const job = (subjectId = uuidv7()) => ({
  kind: 'check-revision' as const,
  subjectId,
  inputDigest: '0'.repeat(64),
});
const ctx = () => jobContext(house.workspace.id);
const named = (jobId: string) => ({ workspaceId: house.workspace.id, jobId });
const messagesOf = async (jobId: string) => {
  const { rows } = await database.query<{ state: string }>(
    "select state from pgboss.job where data->>'jobId' = $1 order by created_on",
    [jobId],
  );
  return rows.map(({ state }) => state);
};
const enqueue = () => withTenant(ctx(), (tx) => enqueueJob(tx, ctx(), job()));
const claim = (jobId: string, worker = 'first') =>
  withTenant(ctx(), (tx) => claimJob(tx, { ...named(jobId), worker })) as Promise<JobRow | null>;

describe('a job', () => {
  it('and its message stand after commit, and neither after a rollback', async () => {
    const kept = await enqueue();
    expect(await messagesOf(kept)).toEqual(['created']);
    let lost = '';
    await expect(
      withTenant(ctx(), async (tx) => {
        lost = await enqueueJob(tx, ctx(), job());
        throw new Error('the caller changed its mind');
      }),
    ).rejects.toThrow('changed its mind');
    expect(lost).not.toBe('');
    expect(await messagesOf(lost)).toEqual([]);
    expect((await database.query('select 1 from jobs where id = $1', [lost])).rows).toEqual([]);
  });

  it('is claimed by one of many', async () => {
    const jobId = await enqueue();
    const claims = await Promise.all(Array.from({ length: 8 }, (_, i) => claim(jobId, `worker ${i}`)));
    expect(claims.filter(Boolean)).toHaveLength(1);
  });

  it('is claimed anew only when its lease has run out, and the earlier try may then write nothing', async () => {
    const jobId = await enqueue();
    const first = await claim(jobId);
    expect(first).toMatchObject({ attempt: 1, state: 'running' });
    expect(await claim(jobId, 'second')).toBeNull();
    await database.query("update jobs set lease_until = now() - interval '1 second' where id = $1", [jobId]);
    expect(await claim(jobId, 'second')).toMatchObject({ attempt: 2, worker: 'second' });

    const stale = { ...named(jobId), attempt: 1 };
    await withTenant(ctx(), async (tx) => {
      expect(await holdsJob(tx, ctx(), stale)).toBe(false);
      expect(await renewLease(tx, stale)).toBe(false);
      expect(await writeProgress(tx, { ...stale, stage: 'late', progress: 1 })).toBe(false);
      expect(await markDone(tx, stale)).toBe(false);
      expect(await markQueued(tx, { ...stale, error: 'late', unspent: true })).toBe(false);
      expect(await holdsJob(tx, ctx(), { ...stale, attempt: 2 })).toBe(true);
    });
  });

  it('that is cancelled is not claimed, and its running try is stopped', async () => {
    const waiting = await enqueue();
    await withTenant(ctx(), (tx) => markCancelled(tx, named(waiting)));
    expect(await claim(waiting)).toBeNull();

    const running = await enqueue();
    const { attempt } = (await claim(running))!;
    await withTenant(ctx(), (tx) => markCancelled(tx, named(running)));
    await withTenant(ctx(), async (tx) => {
      expect(await renewLease(tx, { ...named(running), attempt })).toBe(false);
      expect(await holdsJob(tx, ctx(), { jobId: running, attempt })).toBe(false);
    });
  });

  it('is invisible to another workspace', async () => {
    const jobId = await enqueue();
    const other = await makeHouse(database);
    const theirs = jobContext(other.workspace.id);
    const asTheirs = { workspaceId: house.workspace.id, jobId };
    await withTenant(theirs, async (tx) => {
      expect(await claimJob(tx, { ...asTheirs, worker: 'other' })).toBeNull();
      expect(await markCancelled(tx, asTheirs)).toBe(false);
    });
    expect(await claim(jobId)).not.toBeNull();
  });
});

describe('the sweep', () => {
  it('sends a message for a job that lost its own, once, and for one whose worker fell silent', async () => {
    const lost = await enqueue();
    const silent = await enqueue();
    const fresh = await enqueue();
    await claim(silent);
    await database.query("delete from pgboss.job where data->>'jobId' = any($1)", [[lost, silent, fresh]]);
    await database.query(
      "update jobs set created_at = created_at - interval '1 minute', lease_until = lease_until - interval '1 minute' where id = any($1)",
      [[lost, silent]],
    );
    await sweepJobs();
    await sweepJobs();
    expect(await messagesOf(lost)).toEqual(['created']);
    expect(await messagesOf(silent)).toEqual(['created']);
    expect(await messagesOf(fresh)).toEqual([]);
  });
});
