import { withTenant, type TenantTx } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { conflict, invalid } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { queueLive, queueLiveToPeople } from '@/lib/jobs/queue-live';
import { queueMail } from '@/lib/jobs/queue-mail';
import { lockWorkspace } from '@/lib/workspaces/workspaces-data';
import { recordEnd } from './end-stand-in';
import { workspacePeople, type WorkspacePerson } from './people-data';
import { comingStandIns, dayOfWorkspace, insertStandIn, lockStandIn, type StandInRow } from './stand-in-data';
import { NameStandInInput, type StandInView } from './stand-in-schemas';
import { standInView } from './list-stand-ins';

/**
 * Names who signs for a person while they are away: somebody of the same role, for whole days. One at a time on either
 * side, and nobody hands on what they were handed, so that each name still stands for one other at most.
 */
export async function nameStandIn(ctx: WorkspaceContext, input: unknown): Promise<StandInView> {
  requirePermission(ctx, 'gate.sign');
  const wanted = parseInput(NameStandInInput, input);
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    await lockWorkspace(tx, workspaceId);
    const today = await dayOfWorkspace(tx, workspaceId);
    if (wanted.fromOn < today)
      throw invalid('The first day is over already.', [
        { pointer: '/fromOn', detail: `From today, ${today}, or later.` },
      ]);
    const people = await workspacePeople(tx, workspaceId);
    const standIn = sameRole(ctx, people, wanted.standInId);
    const coming = await comingStandIns(tx, workspaceId);
    const isVoid = (row: StandInRow) => standInView(ctx, row, people, today) === null;
    const standing = coming.filter((row) => !isVoid(row));
    const twice = standing.find(
      (row) =>
        row.personId === ctx.person.id &&
        row.standInId === standIn.id &&
        row.fromOn === wanted.fromOn &&
        row.untilOn === wanted.untilOn,
    );
    if (twice) return standInView(ctx, twice, people, today)!;
    refuseOverlap(ctx, wanted, standing, people);
    // Nobody is shown a row that is void, and none may come back beside this one when its people do.
    for (const row of coming.filter(isVoid)) await endVoid(tx, ctx, row, people);
    const made = await insertStandIn(tx, { workspaceId, personId: ctx.person.id, ...wanted });
    await appendEntry(tx, ctx, {
      action: 'stand-in.named',
      subjectKind: 'stand-in',
      subjectId: made.id,
      detail: {
        personId: ctx.person.id,
        personName: ctx.person.name,
        standInId: standIn.id,
        standInName: standIn.name,
        role: standIn.role,
        fromOn: made.fromOn,
        untilOn: made.untilOn,
      },
    });
    await tellStandIn(tx, ctx, made, standIn);
    return standInView(ctx, made, people, today)!;
  });
}

async function endVoid(
  tx: TenantTx,
  ctx: WorkspaceContext,
  { id }: StandInRow,
  people: WorkspacePerson[],
): Promise<void> {
  const row = await lockStandIn(tx, ctx.workspace.id, id);
  if (row && !row.endedAt) await recordEnd(tx, ctx, row, people);
}

function sameRole(ctx: WorkspaceContext, people: WorkspacePerson[], id: string): WorkspacePerson {
  const role = people.find((person) => person.id === ctx.person.id)?.role;
  const standIn = people.find((person) => person.id === id && id !== ctx.person.id && person.role === role);
  if (standIn) return standIn;
  throw invalid(`Whoever signs for you has your role here, ${ctx.role}.`, [
    { pointer: '/standInId', detail: `Choose another ${ctx.role} of this workspace.` },
  ]);
}

function refuseOverlap(
  ctx: WorkspaceContext,
  wanted: NameStandInInput,
  standing: StandInRow[],
  people: WorkspacePerson[],
): void {
  const nameOf = (id: string) => people.find((person) => person.id === id)?.name ?? '';
  for (const row of standing) {
    if (row.untilOn < wanted.fromOn || row.fromOn > wanted.untilOn) continue;
    const days = `from ${row.fromOn} to ${row.untilOn}`;
    if (row.personId === ctx.person.id)
      throw conflict(
        'away-already',
        `${nameOf(row.standInId)} signs for you ${days} already. End that first, or choose other days.`,
      );
    if (row.standInId === ctx.person.id)
      throw conflict(
        'stands-in',
        `You sign for ${nameOf(row.personId)} ${days}; what was handed to you cannot be handed on.`,
      );
    if (row.personId === wanted.standInId)
      throw conflict('stand-in-away', `${nameOf(row.personId)} is away themselves ${days}.`);
    if (row.standInId === wanted.standInId)
      throw conflict(
        'stands-already',
        `${nameOf(row.standInId)} signs for ${nameOf(row.personId)} ${days}, and for one person at a time only.`,
      );
  }
}

async function tellStandIn(
  tx: TenantTx,
  ctx: WorkspaceContext,
  row: StandInRow,
  standIn: WorkspacePerson,
): Promise<void> {
  const { workspace } = ctx;
  await queueMail(tx, { workspaceId: workspace.id }, [
    {
      request: {
        template: 'stand-in-named',
        to: { personId: standIn.id, email: standIn.email, name: standIn.name },
        workspaceId: workspace.id,
        workspaceName: workspace.name,
        path: `/w/${workspace.slug}/gate-plan`,
        awayName: ctx.person.name,
        fromOn: row.fromOn,
        untilOn: row.untilOn,
      },
      dedupeKey: `stand-in-named:${row.id}`,
    },
  ]);
  await queueLive(tx, ctx, { name: 'gate-plan.changed', data: { id: workspace.id } });
  await queueLiveToPeople(tx, ctx, [standIn.id], { name: 'today.changed', data: { id: row.id } });
}
