import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { asId } from '@/lib/review/as-id';
import { lockRevision, moveRevision } from '@/lib/review/revision-data';
import { ReasonInput } from '@/lib/review/schemas';
import { tellPeople } from './tell-people';

export type EndedView = { revisionId: string; letter: string; state: 'recalled' | 'retired'; reason: string };

const endings = {
  recalled: { permission: 'revision.recall', mail: 'revision-recalled' },
  retired: { permission: 'revision.retire', mail: 'revision-retired' },
} as const;

/** Ends a release, with a reason that stays on record; everybody in the workspace is told. */
export async function endRelease(
  ctx: WorkspaceContext,
  revisionId: string,
  input: unknown,
  state: keyof typeof endings,
): Promise<EndedView> {
  requirePermission(ctx, endings[state].permission);
  const { reason } = parseInput(ReasonInput, input);
  return withTenant(ctx, async (tx) => {
    const { template, revision } = await lockRevision(tx, ctx.workspace.id, asId(revisionId, 'revision'));
    if (revision.state !== 'released')
      throw conflict(
        'not-released',
        `Revision ${revision.letter} is ${revision.state.replace('_', ' ')}; only a released one can be ${state}.`,
      );
    const moved = await moveRevision(tx, ctx, revision, state, reason);
    const occasion = `revision-${state}:${revision.id}`;
    await tellPeople(tx, ctx, { template, revision: moved, occasion }, (base) => ({
      template: endings[state].mail,
      ...base,
      printedName: ctx.person.name,
      reason,
    }));
    await appendEntry(tx, ctx, {
      action: `revision.${state}`,
      subjectKind: 'revision',
      subjectId: revision.id,
      detail: { templateId: template.id, letter: revision.letter, role: ctx.role, reason },
    });
    return { revisionId: revision.id, letter: revision.letter, state, reason };
  });
}
