import type { TenantTx } from '@/db/tenant';
import { workspaceIdOf, type JobContext, type WorkspaceContext } from '@/lib/auth/context';
import { appendEntry } from '@/lib/audit/append-entry';
import { openMustSettle } from './docket-data';
import { conditionsHold } from './gate-conditions';
import { changeGate, gatesOf, type GateRow } from './gate-data';
import type { GatesAt } from './gate-view';
import { lockContent } from './lock-content';
import { mayPass } from './may-pass';
import { mailAbout, tellToday } from './revision-mails';
import { loadRevisionParts, type RevisionRow, type TemplateRow } from './revision-data';
import { signersOf } from './signers-of';
import { tellShort } from './tell-short';
import { askedAt, isShort, quorumReached, whoMaySign, type GateAt } from './who-signs';

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
  let shared: GatesAt | null = null;
  const all = await gatesOf(tx, workspaceId, revision.id, { lock: true });
  for (const gate of all) {
    if (gate.state === 'passed') continue;
    if (gate.state !== 'waiting' && gate.state !== 'open') return passed;
    const opened = gate.state === 'waiting' ? await changeGate(tx, gate, 'open') : gate;
    if (gate.rule.kind === 'automatic') {
      if (!(await conditionsHold(tx, revision, gate.rule))) return passed;
      passed.push(await changeGate(tx, opened, 'passed'));
      continue;
    }
    shared ??= await signersOf(tx, revision, (await loadRevisionParts(tx, revision)).mesh);
    const at = { ...shared, gate: opened };
    if (quorumReached(at)) {
      const isLast = gate === all.at(-1);
      if (!(await mayPass(tx, revision, at.signed, isLast))) {
        if (isLast) await tellShort(tx, ctx, template, revision, at);
        return passed;
      }
      passed.push(await changeGate(tx, opened, 'passed'));
      if (gate.rule.quorum === 'all') await recordEverybody(tx, ctx, template, revision, at);
      continue;
    }
    if (gate.state === 'waiting') await tellAwaited(tx, ctx, template, revision, at);
    if (isShort(at)) await tellShort(tx, ctx, template, revision, at);
    return passed;
  }
  if (all.length) await lockContent(tx, ctx, revision);
  return passed;
}

/** Who "everybody" was is not in the plan: it is written down when the gate passes, for whoever verifies it. */
async function recordEverybody(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  template: TemplateRow,
  revision: RevisionRow,
  at: GateAt,
): Promise<void> {
  await appendEntry(tx, ctx, {
    action: 'gate.passed',
    subjectKind: 'revision',
    subjectId: revision.id,
    detail: {
      templateId: template.id,
      number: template.number,
      letter: revision.letter,
      gateId: at.gate.id,
      gate: at.gate.rule.name,
      asked: askedAt(at).map(({ id, name }) => ({ id, name })),
    },
  });
}

async function tellAwaited(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  template: TemplateRow,
  revision: RevisionRow,
  at: GateAt & { gate: GateRow },
): Promise<void> {
  const awaited = whoMaySign(at);
  const openItems = (await openMustSettle(tx, revision.workspaceId, revision.id)).length;
  const about = { template, revision, occasion: `gate-waits:${at.gate.id}`, evenActor: true };
  await mailAbout(tx, ctx, awaited, about, (base) => ({
    template: 'gate-waits',
    ...base,
    gateName: at.gate.rule.name,
    openItems,
    dueOn: at.gate.dueOn,
  }));
  await tellToday(tx, ctx, awaited, revision.id);
}
