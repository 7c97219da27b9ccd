import type { TenantTx } from '@/db/tenant';
import { digestOf } from '@/lib/audit/canonical';
import { findCheckRun, findingsOf, findReportById } from './check-data';
import { waiversOf } from './docket-data';
import { findLock, gatesOf, signaturesOf } from './gate-data';
import { loadDocket } from './load-docket';
import { loadRevisionParts, type RevisionRow } from './revision-data';

/**
 * Digest over every field that is frozen with a revision, ids and times included. Written into the audit chain
 * at the lock, so that any later change of any of them shows. A schema names its fields: columns that are added
 * later belong to a next schema and leave old digests as they are. Schema 2 has due days and stand-ins.
 */
export async function frozenRecord(
  tx: TenantTx,
  revision: RevisionRow,
  schema: 1 | 2 = 2,
): Promise<{ schema: 1 | 2; digest: string }> {
  const { workspaceId, id } = revision;
  const { mesh, recipe } = await loadRevisionParts(tx, revision);
  const run = await findCheckRun(tx, workspaceId, id);
  const report = run?.reportId ? await findReportById(tx, workspaceId, run.reportId) : null;
  const docket = await loadDocket(tx, workspaceId, id);
  const agreed = docket.threads.filter(({ thread }) => !thread.afterApproval);
  const record = {
    revision: pick(
      revision,
      'id templateId ordinal letter meshId recipeId gatePlanId note authorId authorName postedAt',
    ),
    mesh: pick(
      mesh,
      'id templateId fileName bytes sha256 format unit triangles boundsMm storeKey createdBy createdAt',
    ),
    recipe: pick(recipe, 'id body digest sheetMaterial gaugeMm printMaterial nozzleMm layerMm createdAt'),
    run: pick(run, 'id revisionId jobId state verdict reportId error createdAt finishedAt version'),
    report: pick(report, 'id meshSha256 recipeDigest engineVersion sha256 createdAt'),
    findings: (await findingsOf(tx, workspaceId, id)).map((row) =>
      pick(
        row,
        'id revisionId ordinal checkId status measured limit unit message remedy basis places createdAt',
      ),
    ),
    waivers: (await waiversOf(tx, workspaceId, id)).map((row) =>
      pick(row, 'id revisionId findingId reason waivedBy waivedByName createdAt'),
    ),
    threads: agreed.map(({ thread, placement, notes }) => ({
      thread: pick(
        thread,
        'id templateId revisionId findingId mustSettle afterApproval state settledBy settledByName settledAt openedBy openedByName createdAt version continues',
      ),
      placement: pick(placement, 'id threadId revisionId pin standing distanceMm carriedFrom createdAt'),
      notes: notes.map((note) =>
        pick(
          note,
          'id threadId revisionId body text mentions authorId authorName clientKey createdAt version',
        ),
      ),
    })),
    gates: (await gatesOf(tx, workspaceId, id)).map((row) =>
      pick(row, `id revisionId ordinal rule state openedAt passedAt version${schema > 1 ? ' dueOn' : ''}`),
    ),
    signatures: (await signaturesOf(tx, workspaceId, id)).map((row) =>
      pick(
        row,
        `id revisionId gateId decision signerId printedName role meaning reason contentDigest method signedAt timeZone${schema > 1 ? ' signedForId signedForName' : ''}`,
      ),
    ),
    lock: pick(await findLock(tx, workspaceId, id), 'revisionId contentDigest content docket lockedAt'),
  };
  return { schema, digest: digestOf(record) };
}

/** The named fields of a row as JSON: times in UTC with milliseconds, what is not there as null. */
function pick(row: object | null, fields: string): Record<string, unknown> | null {
  if (!row) return null;
  const values = row as Record<string, unknown>;
  return Object.fromEntries(
    fields.split(' ').map((name) => {
      const value = values[name];
      return [name, value instanceof Date ? value.toISOString() : (value ?? null)];
    }),
  );
}
