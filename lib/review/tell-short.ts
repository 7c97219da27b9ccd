import type { TenantTx } from '@/db/tenant';
import type { JobContext, WorkspaceContext } from '@/lib/auth/context';
import type { GateRow } from './gate-data';
import type { RevisionRow, TemplateRow } from './revision-data';
import { mailAbout } from './revision-mails';
import { missingAt, quorumReached, signedAt, type GateAt } from './who-signs';

/**
 * Tells the leads that a gate cannot pass as things stand: too few are left, or all of them signed something else than
 * stands there now. Once for a gate; the outbox forgets a sent mail after a week, and then it is said again while it
 * stays so.
 */
export async function tellShort(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  template: TemplateRow,
  revision: RevisionRow,
  at: GateAt & { gate: GateRow },
): Promise<void> {
  const leads = at.people.filter(({ role }) => role === 'lead');
  const { id, rule } = at.gate;
  const about = { template, revision, occasion: `gate-short:${id}`, evenActor: true };
  await mailAbout(tx, ctx, leads, about, (base) => ({
    template: 'gate-short',
    ...base,
    gateName: rule.name,
    needed: rule.quorum === 'all' ? 1 : rule.quorum,
    have: signedAt(at),
    left: missingAt(at).length,
    held: quorumReached(at),
  }));
}
