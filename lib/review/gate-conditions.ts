import type { GateRule } from '@/db/schema/workspaces';
import type { TenantTx } from '@/db/tenant';
import { findCheckRun, findingsOf } from './check-data';
import { openMustSettle, waiversOf } from './docket-data';
import type { RevisionRow } from './revision-data';

/** What an automatic gate waits for; those of plans from before it could be chosen wait for the checks. */
export function waitsFor({ kind, conditions = ['checks-pass'] }: GateRule) {
  const automatic = kind === 'automatic';
  return {
    checks: automatic && conditions.includes('checks-pass'),
    docket: automatic && conditions.includes('docket-settled'),
  };
}

/** Whether everything that an automatic gate waits for is so now. */
export async function conditionsHold(tx: TenantTx, revision: RevisionRow, rule: GateRule): Promise<boolean> {
  const { checks, docket } = waitsFor(rule);
  if (checks && !(await formingHolds(tx, revision))) return false;
  return !docket || (await openMustSettle(tx, revision.workspaceId, revision.id)).length === 0;
}

/** Whether the check has finished on this revision and every failing finding is waived. */
export async function formingHolds(tx: TenantTx, revision: RevisionRow): Promise<boolean> {
  const { workspaceId, id } = revision;
  const run = await findCheckRun(tx, workspaceId, id);
  if (run?.state !== 'finished') return false;
  const waived = new Set((await waiversOf(tx, workspaceId, id)).map((waiver) => waiver.findingId));
  const found = await findingsOf(tx, workspaceId, id);
  return found.every((finding) => finding.status !== 'fail' || waived.has(finding.id));
}
