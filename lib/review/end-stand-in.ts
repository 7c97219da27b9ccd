import { withTenant, type TenantTx } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { forbidden, notFound } from '@/lib/errors/app-error';
import { queueLive, queueLiveToPeople } from '@/lib/jobs/queue-live';
import { mayEndStandIn } from './list-stand-ins';
import { workspacePeople, type WorkspacePerson } from './people-data';
import { endStandInRow, lockStandIn, type StandInRow } from './stand-in-data';

/** Ends that somebody signs for another; what they signed meanwhile stays. Ended already: nothing changes. */
export async function endStandIn(ctx: WorkspaceContext, id: string): Promise<void> {
  requirePermission(ctx, 'gate.sign');
  await withTenant(ctx, async (tx) => {
    const row = await lockStandIn(tx, ctx.workspace.id, id);
    if (!row) throw notFound('stand-in');
    if (!mayEndStandIn(ctx, row))
      throw forbidden('Only the two whom it concerns and a lead end it.', 'stand-in');
    if (row.endedAt) return;
    await recordEnd(tx, ctx, row, await workspacePeople(tx, ctx.workspace.id));
    await queueLive(tx, ctx, { name: 'gate-plan.changed', data: { id: ctx.workspace.id } });
    await queueLiveToPeople(tx, ctx, [row.personId, row.standInId], {
      name: 'today.changed',
      data: { id: row.id },
    });
  });
}

/** Ends a row that the caller holds, and writes it down. */
export async function recordEnd(
  tx: TenantTx,
  ctx: WorkspaceContext,
  row: StandInRow,
  people: WorkspacePerson[],
): Promise<void> {
  await endStandInRow(tx, row);
  const nameOf = (id: string) => people.find((person) => person.id === id)?.name ?? 'somebody who has left';
  await appendEntry(tx, ctx, {
    action: 'stand-in.ended',
    subjectKind: 'stand-in',
    subjectId: row.id,
    detail: {
      personId: row.personId,
      personName: nameOf(row.personId),
      standInId: row.standInId,
      standInName: nameOf(row.standInId),
      fromOn: row.fromOn,
      untilOn: row.untilOn,
    },
  });
}
