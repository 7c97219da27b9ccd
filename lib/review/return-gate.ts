import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { confirmPassword } from '@/lib/auth/confirm-password';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { parseInput } from '@/lib/http/read-input';
import { asId } from './as-id';
import { closeRevision } from './close-revision';
import { changeGate, findGate, insertSignature } from './gate-data';
import { signatureView } from './gate-view';
import { holdGate } from './hold-gate';
import { workspacePeople } from './people-data';
import { mailAbout, tellToday } from './revision-mails';
import { ReturnInput, type SignatureView } from './schemas';

/** Returns a revision at its open gate, with a reason: the review ends, the next revision carries the open items. */
export async function returnGate(
  ctx: WorkspaceContext,
  gateId: string,
  input: unknown,
): Promise<SignatureView> {
  requirePermission(ctx, 'gate.sign');
  const { digest, password, code, reason } = parseInput(ReturnInput, input);
  const id = asId(gateId, 'gate');
  const workspaceId = ctx.workspace.id;
  await withTenant(ctx, (tx) => findGate(tx, workspaceId, id));
  const method = await confirmPassword(ctx.person, password, code);
  return withTenant(ctx, async (tx) => {
    const held = await holdGate(tx, ctx, id, digest);
    const { template, revision, gate } = held;
    const signature = await insertSignature(tx, {
      workspaceId,
      revisionId: revision.id,
      gateId: id,
      decision: 'return',
      signerId: ctx.person.id,
      printedName: ctx.person.name,
      role: held.role,
      meaning: 'Returned for change',
      reason,
      contentDigest: held.digest,
      method,
      timeZone: ctx.person.timeZone,
      signedForId: held.standsFor?.id ?? null,
      signedForName: held.standsFor?.name ?? null,
    });
    await changeGate(tx, gate, 'returned');
    await appendEntry(tx, ctx, {
      action: 'gate.returned',
      subjectKind: 'revision',
      subjectId: revision.id,
      detail: {
        templateId: template.id,
        number: template.number,
        letter: revision.letter,
        gateId: id,
        gate: gate.rule.name,
        signatureId: signature.id,
        printedName: signature.printedName,
        role: signature.role,
        reason,
        method,
        contentDigest: held.digest,
        signedFor: held.standsFor && { id: held.standsFor.id, name: held.standsFor.name },
        docket: held.content.docket,
        named: held.content.template,
      },
    });
    await closeRevision(tx, ctx, revision, 'returned', reason);
    const people = await workspacePeople(tx, workspaceId);
    const about = { template, revision, occasion: `revision-returned:${signature.id}` };
    await mailAbout(tx, ctx, people, about, (base) => ({
      template: 'revision-returned',
      ...base,
      printedName: signature.printedName,
      role: signature.role,
      reason,
    }));
    await tellToday(tx, ctx, people, revision.id);
    return signatureView(signature);
  });
}
