import { packRecord } from '@/lib/production/pack-record';
import type { RevisionRow } from '@/lib/review/revision-data';
import type { AuditRow } from './data';
import { sameJson } from './same-json';
import type { releaseWithPack } from './verify-data';

const stateOf: Record<string, string> = {
  'revision.locked': 'approved',
  'revision.released': 'released',
  'revision.superseded': 'superseded',
  'revision.recalled': 'recalled',
  'revision.retired': 'retired',
};

/** A superseded revision's reason is made from the letter of the one that took its place. */
const reasonOf = ({ action, detail }: AuditRow): string | null =>
  action === 'revision.superseded'
    ? `Superseded by ${String(detail.by)}.`
    : ((detail.reason as string) ?? null);

/** State, reason and author of a revision as its entries have them. */
export function stateFaults(revision: RevisionRow, entries: AuditRow[]): string[] {
  const faults: string[] = [];
  const last = entries.filter(({ action, subjectId }) => stateOf[action] && subjectId === revision.id).at(-1);
  if (!last || stateOf[last.action] !== revision.state)
    faults.push(
      `its state is ${revision.state}, but the audit chain says ${last ? stateOf[last.action] : 'nothing'}`,
    );
  else if (reasonOf(last) !== revision.stateReason)
    faults.push('the reason of its state is not as the audit chain has it');
  const posted = entries.find(({ action }) => action === 'revision.posted');
  if (!posted || posted.actorId !== revision.authorId || posted.actorName !== revision.authorName)
    faults.push('its author is not as the audit chain has it');
  return faults;
}

/** The release and its pack's record as their entries have them. */
export function releaseFaults(
  found: Awaited<ReturnType<typeof releaseWithPack>>,
  entries: AuditRow[],
): string[] {
  const released = entries.find(({ action }) => action === 'revision.released');
  if (!found) return released ? ['its release is missing'] : [];
  const faults: string[] = [];
  const { release, pack } = found;
  const stored = {
    releaseId: release.id,
    by: release.releasedBy,
    byName: release.releasedByName,
    note: release.note,
    jobId: release.jobId,
    releasedAt: release.createdAt.toISOString(),
  };
  const { releaseId, note, jobId, releasedAt } = released?.detail ?? {};
  const told = { releaseId, by: released?.actorId, byName: released?.actorName, note, jobId, releasedAt };
  if (!sameJson(stored, told)) faults.push('the release is not as the audit chain has it');
  const built = entries.find(({ action }) => action === 'pack.built');
  if (!pack && built) faults.push('its release pack is missing');
  if (pack && !sameJson(packRecord(pack), built?.detail.pack))
    faults.push('the release pack’s record is not as the audit chain has it');
  return faults;
}
