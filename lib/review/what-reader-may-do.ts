import type { WorkspaceContext } from '@/lib/auth/context';
import { permits } from '@/lib/workspaces/roles';
import type { GateRow } from './gate-data';
import type { GatesAt } from './gate-view';
import type { RevisionRow } from './revision-data';
import type { RevisionView } from './schemas';
import { mayMakeFrom } from './recalled';
import { rightAt } from './who-signs';

type Standing = {
  revision: RevisionRow;
  gates: GateRow[];
  shared: GatesAt;
  mustSettle: number;
  checkFinished: boolean;
  hasPack: boolean;
  packFailed: boolean;
};

/** What the page offers; every verb decides again for itself. */
export function whatReaderMayDo(ctx: WorkspaceContext, at: Standing): RevisionView['can'] {
  const { revision } = at;
  const may = (permission: Parameters<typeof permits>[1]) => permits(ctx.role, permission);
  const reviewed = revision.state === 'in_review';
  const unlocked = reviewed || revision.state === 'returned' || revision.state === 'withdrawn';
  // Nothing may be made from a recalled revision; a lead may still look into it.
  const makes = may('pack.download') && mayMakeFrom(ctx, revision);
  return {
    note: may('docket.note'),
    settle: may('docket.settle') && unlocked,
    waive: may('finding.waive') && reviewed,
    sign: may('gate.sign') && reviewed ? gateToSign(ctx, at) : null,
    withdraw:
      may('revision.withdraw') &&
      reviewed &&
      revision.authorId === ctx.person.id &&
      at.shared.signed.length === 0,
    release: may('revision.release') && revision.state === 'approved',
    rebuild: may('revision.release') && at.packFailed && revision.state !== 'recalled',
    recall: may('revision.recall') && revision.state === 'released',
    retire: may('revision.retire') && revision.state === 'released',
    download: makes && at.hasPack,
    mesh: makes,
    post: may('revision.post'),
  };
}

function gateToSign(ctx: WorkspaceContext, at: Standing): RevisionView['can']['sign'] {
  const gate = at.gates.find((row) => row.state === 'open' && row.rule.kind === 'people');
  if (!gate) return null;
  const me = at.shared.people.find(({ id }) => id === ctx.person.id);
  const right = me ? rightAt({ ...at.shared, gate }, me) : null;
  if (!right) return null;
  const items = at.mustSettle === 1 ? 'One item' : `${at.mustSettle} items`;
  const blocked = !at.checkFinished
    ? 'The check has not finished yet.'
    : at.mustSettle
      ? `${items} must be settled first.`
      : null;
  return {
    gateId: gate.id,
    gateName: gate.rule.name,
    meaning: gate.rule.meaning,
    blocked,
    standsFor: right.standsFor?.name ?? null,
  };
}
