import type { TenantTx } from '@/db/tenant';
import { workspaceIdOf, type JobContext, type WorkspaceContext } from '@/lib/auth/context';
import { findCheckRun, findingsOf } from './check-data';
import { openMustSettle, waiversOf } from './docket-data';
import { changeGate, gatesOf, signaturesOf, type GateRow } from './gate-data';
import { lockContent } from './lock-content';
import { workspacePeople } from './people-data';
import { mailAbout, tellToday } from './revision-mails';
import { loadRevisionParts, type RevisionRow, type TemplateRow } from './revision-data';
import { makersOf, whoMaySign } from './who-signs';

/** Whether the check has finished on this revision and every failing finding is waived. */
export async function formingHolds(tx: TenantTx, revision: RevisionRow): Promise<boolean> {
  const { workspaceId, id } = revision;
  const run = await findCheckRun(tx, workspaceId, id);
  if (run?.state !== 'finished') return false;
  const waived = new Set((await waiversOf(tx, workspaceId, id)).map((waiver) => waiver.findingId));
  const found = await findingsOf(tx, workspaceId, id);
  return found.every((finding) => finding.status !== 'fail' || waived.has(finding.id));
}

/**
 * Lets a revision in review go as far along its gates as it can: opens the next gate, passes an automatic one
 * whose condition holds, tells those who are awaited at a people's gate, and locks the revision when the last
 * gate has passed. The caller holds template and revision. Returns the gates that passed here.
 */
export async function advanceGates(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  template: TemplateRow,
  revision: RevisionRow,
): Promise<GateRow[]> {
  const workspaceId = workspaceIdOf(ctx);
  const passed: GateRow[] = [];
  const all = await gatesOf(tx, workspaceId, revision.id, { lock: true });
  for (const gate of all) {
    if (gate.state === 'passed') continue;
    if (gate.state !== 'waiting' && gate.state !== 'open') return passed;
    const opened = gate.state === 'waiting' ? await changeGate(tx, gate, 'open') : gate;
    if (gate.rule.kind === 'automatic') {
      if (!(await formingHolds(tx, revision))) return passed;
      passed.push(await changeGate(tx, opened, 'passed'));
      continue;
    }
    const signed = (await signaturesOf(tx, workspaceId, revision.id)).filter((s) => s.gateId === gate.id);
    if (signed.length >= gate.rule.quorum) {
      passed.push(await changeGate(tx, opened, 'passed'));
      continue;
    }
    if (gate.state === 'waiting') await tellAwaited(tx, ctx, template, revision, opened);
    return passed;
  }
  if (all.length) await lockContent(tx, ctx, revision);
  return passed;
}

async function tellAwaited(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  template: TemplateRow,
  revision: RevisionRow,
  gate: GateRow,
): Promise<void> {
  const people = await workspacePeople(tx, revision.workspaceId);
  const signed = await signaturesOf(tx, revision.workspaceId, revision.id);
  const { mesh } = await loadRevisionParts(tx, revision);
  const awaited = whoMaySign(gate, makersOf(revision, mesh), people, signed);
  const openItems = (await openMustSettle(tx, revision.workspaceId, revision.id)).length;
  const about = { template, revision, occasion: `gate-waits:${gate.id}`, evenActor: true };
  await mailAbout(tx, ctx, awaited, about, (base) => ({
    template: 'gate-waits',
    ...base,
    gateName: gate.rule.name,
    openItems,
  }));
  await tellToday(tx, ctx, awaited, revision.id);
}
