import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { confirmPassword } from '@/lib/auth/confirm-password';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { advanceGates } from './advance-gates';
import { asId } from './as-id';
import { findGate, findLockDigest, insertSignature } from './gate-data';
import { signatureView } from './gate-view';
import { holdGate, requireSettled } from './hold-gate';
import { SignInput, type SignatureView } from './schemas';
import { tellSigned } from './tell-signed';

export type SignResult = { signature: SignatureView; gatePassed: boolean; locked: boolean };

/**
 * Puts the reader's name to exactly the content that they were shown, after asking for the password again. The
 * signature that completes the last gate locks the revision. Refusals change nothing and say what stands in the way.
 */
export async function signGate(ctx: WorkspaceContext, gateId: string, input: unknown): Promise<SignResult> {
  requirePermission(ctx, 'gate.sign');
  const { digest, password, code } = parseInput(SignInput, input);
  const id = asId(gateId, 'gate');
  const workspaceId = ctx.workspace.id;
  await withTenant(ctx, (tx) => findGate(tx, workspaceId, id));
  const method = await confirmPassword(ctx.person, password, code);
  return withTenant(ctx, async (tx) => {
    const held = await holdGate(tx, ctx, id, digest);
    await requireSettled(tx, held);
    const { template, revision, gate } = held;
    const signature = await insertSignature(tx, {
      workspaceId,
      revisionId: revision.id,
      gateId: id,
      decision: 'sign',
      signerId: ctx.person.id,
      printedName: ctx.person.name,
      role: held.role,
      meaning: gate.rule.meaning,
      contentDigest: held.digest,
      method,
      timeZone: ctx.person.timeZone,
      signedForId: held.standsFor?.id ?? null,
      signedForName: held.standsFor?.name ?? null,
    });
    await appendEntry(tx, ctx, {
      action: 'gate.signed',
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
        meaning: signature.meaning,
        method,
        signedAt: signature.signedAt.toISOString(),
        contentDigest: held.digest,
        signedFor: held.standsFor && { id: held.standsFor.id, name: held.standsFor.name },
        // Notes may still join before the last gate: the docket of this digest is kept here, title and due date too.
        docket: held.content.docket,
        named: held.content.template,
      },
    });
    const passed = await advanceGates(tx, ctx, template, revision);
    const locked = (await findLockDigest(tx, workspaceId, revision.id)) !== null;
    await tellSigned(tx, ctx, { template, revision, signature, locked });
    await queueLive(
      tx,
      ctx,
      { name: 'revision.changed', data: { id: revision.id, templateId: template.id } },
      { name: 'template.changed', data: { id: template.id } },
    );
    return {
      signature: signatureView(signature),
      gatePassed: passed.some((row) => row.id === id),
      locked,
    };
  });
}
