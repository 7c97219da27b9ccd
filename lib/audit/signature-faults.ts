import { partsOf } from '@/lib/review/activity-data';
import type { Content } from '@/lib/review/content';
import type { SignatureRow } from '@/lib/review/gate-data';
import { digestOf } from './canonical';
import type { AuditRow } from './data';
import { sameJson } from './same-json';

/** Whom a signer stood in for, as signatures are told everywhere. */
export const signedForOf = ({ signedForId, signedForName }: SignatureRow) =>
  signedForId || signedForName ? { id: signedForId, name: signedForName } : null;

/** Holds each signature against its entry in the chain and the content that it was put to, and the other way round. */
export function signatureFaults(
  signed: SignatureRow[],
  entries: AuditRow[],
  locked: Content,
  digest: string,
): string[] {
  const faults: string[] = [];
  const witnessed = entries.filter(({ action }) => action === 'gate.signed' || action === 'gate.returned');
  for (const row of signed) {
    const name = `the signature of ${row.printedName} (${row.id})`;
    const witness = witnessed.find(({ detail }) => detail.signatureId === row.id);
    if (!witness) {
      faults.push(`${name} has no entry in the audit chain`);
      continue;
    }
    const { detail } = witness;
    const told = {
      revisionId: witness.subjectId,
      signerId: witness.actorId,
      gateId: detail.gateId,
      printedName: detail.printedName,
      role: detail.role,
      method: detail.method,
      contentDigest: detail.contentDigest,
      meaning: detail.meaning ?? row.meaning,
      signedAt: detail.signedAt ?? row.signedAt.toISOString(),
      reason: detail.reason ?? null,
      signedFor: detail.signedFor ?? null,
      decision: witness.action === 'gate.signed' ? 'sign' : 'return',
    };
    const {
      revisionId,
      signerId,
      gateId,
      printedName,
      role,
      method,
      contentDigest,
      meaning,
      reason,
      decision,
    } = row;
    const stored = {
      revisionId,
      signerId,
      gateId,
      printedName,
      role,
      method,
      contentDigest,
      meaning,
      reason,
      decision,
      signedAt: row.signedAt.toISOString(),
      signedFor: signedForOf(row),
    };
    if (!sameJson(stored, told)) faults.push(`${name} is not as the audit chain has it`);
    if (digestOf({ ...locked, ...partsOf(detail) }) !== row.contentDigest)
      faults.push(`${name} stands on other content than was locked`);
  }
  const last = signed.filter(({ decision }) => decision === 'sign').at(-1);
  if (last && last.contentDigest !== digest)
    faults.push('the last signature does not stand on the locked content');
  for (const { detail, seq } of witnessed)
    if (!signed.some(({ id }) => id === detail.signatureId))
      faults.push(`the signature of ${String(detail.printedName)} in entry ${seq} is missing`);
  return faults;
}
