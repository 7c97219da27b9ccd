import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { permits } from '@/lib/workspaces/roles';
import { workspacePeople, type WorkspacePerson } from './people-data';
import { comingStandIns, dayOfWorkspace, type StandInRow } from './stand-in-data';
import type { StandInsView, StandInView } from './stand-in-schemas';

/** Who is away, now or soon, and who signs for them; everybody of the workspace may see it. */
export async function listStandIns(ctx: WorkspaceContext): Promise<StandInsView> {
  requirePermission(ctx, 'workspace.read');
  return withTenant(ctx, async (tx) => {
    const today = await dayOfWorkspace(tx, ctx.workspace.id);
    const people = await workspacePeople(tx, ctx.workspace.id);
    const rows = await comingStandIns(tx, ctx.workspace.id);
    return { today, standIns: rows.flatMap((row) => standInView(ctx, row, people, today) ?? []) };
  });
}

/** Who may end it: whoever is away, whoever stands in, and a lead. */
export const mayEndStandIn = (ctx: WorkspaceContext, row: StandInRow): boolean =>
  [row.personId, row.standInId].includes(ctx.person.id) || permits(ctx.role, 'gate.plan');

/** Null once it is void: one of the two has left, or their roles are not the same any more. */
export function standInView(
  ctx: WorkspaceContext,
  row: StandInRow,
  people: WorkspacePerson[],
  today: string,
): StandInView | null {
  const away = people.find(({ id }) => id === row.personId);
  const standIn = people.find(({ id }) => id === row.standInId);
  if (!away || !standIn || away.role !== standIn.role) return null;
  return {
    id: row.id,
    away: { id: away.id, name: away.name },
    standIn: { id: standIn.id, name: standIn.name },
    role: away.role,
    fromOn: row.fromOn,
    untilOn: row.untilOn,
    now: row.fromOn <= today && today <= row.untilOn,
    mayEnd: mayEndStandIn(ctx, row),
  };
}
