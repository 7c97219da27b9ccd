import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict, notFound } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { advanceGates } from './advance-gates';
import { asId } from './as-id';
import { findFinding } from './check-data';
import { formingHolds } from './gate-conditions';
import { insertWaiver, waiversOf } from './docket-data';
import { viewDocketRows } from './docket-view';
import { loadDocket } from './load-docket';
import { lockRevision } from './revision-data';
import { WaiveInput, type DocketView } from './schemas';
import { tellCheckEnded } from './tell-check';

/** A lead lets a failing finding stand, with a reason that is shown for ever after; the gates are looked at again. */
export async function waiveFinding(
  ctx: WorkspaceContext,
  findingId: string,
  input: unknown,
): Promise<DocketView> {
  requirePermission(ctx, 'finding.waive');
  const { reason } = parseInput(WaiveInput, input);
  const id = asId(findingId, 'finding');
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    const finding = await findFinding(tx, workspaceId, id);
    if (!finding) throw notFound('finding');
    const { template, revision } = await lockRevision(tx, workspaceId, finding.revisionId);
    if (revision.state !== 'in_review')
      throw conflict(
        'not-in-review',
        `Revision ${revision.letter} is not in review any more, so nothing of it can be waived.`,
      );
    if (finding.status !== 'fail')
      throw conflict(
        'not-failing',
        'Only a failing finding can be waived; this one does not keep any gate shut.',
      );
    if ((await waiversOf(tx, workspaceId, revision.id)).some((waiver) => waiver.findingId === id))
      throw conflict('already-waived', 'This finding was waived already. Reload to see by whom and why.');
    await insertWaiver(tx, {
      workspaceId,
      revisionId: revision.id,
      findingId: id,
      reason,
      waivedBy: ctx.person.id,
      waivedByName: ctx.person.name,
    });
    if (await formingHolds(tx, revision)) await tellCheckEnded(tx, ctx, { template, revision });
    const passed = await advanceGates(tx, ctx, template, revision);
    await appendEntry(tx, ctx, {
      action: 'finding.waived',
      subjectKind: 'finding',
      subjectId: id,
      detail: {
        templateId: template.id,
        number: template.number,
        revisionId: revision.id,
        letter: revision.letter,
        checkId: finding.checkId,
        reason,
        gatesPassed: passed.map((gate) => gate.rule.name),
      },
    });
    await queueLive(
      tx,
      ctx,
      { name: 'docket.changed', data: { revisionId: revision.id } },
      { name: 'revision.changed', data: { id: revision.id, templateId: template.id } },
      { name: 'template.changed', data: { id: template.id } },
    );
    return viewDocketRows(revision.id, await loadDocket(tx, workspaceId, revision.id));
  });
}
