import { enterScope, type TenantTx } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { jobContext, workspaceContext, type Person, type Studio, type Workspace } from '@/lib/auth/context';
import { queueLive, queueLiveToPeople } from '@/lib/jobs/queue-live';
import type { StudioRole } from '@/lib/workspaces/roles';

type StaffChange = {
  action: 'person.joined' | 'person.role-changed' | 'person.removed';
  personId: string;
  detail: Record<string, unknown>;
};

/**
 * Writes a change of staff into the chain of each of the studio's workspaces, and tells who is there. Comes
 * last in its transaction: the chain heads are the last rows locked, in the order of the ids (as
 * `workspacesOfStudio` gives them), and afterwards the transaction sees only the last workspace.
 */
export async function tellWorkspaces(
  tx: TenantTx,
  actor: { person: Person; studio: Studio; role: StudioRole },
  workspaces: Workspace[],
  { action, personId, detail }: StaffChange,
): Promise<void> {
  const { person, studio, role } = actor;
  for (const workspace of workspaces) {
    // Who has just left sees none of them any more; the entry is theirs all the same.
    await enterScope(tx, jobContext(workspace.id).scope);
    const inside = workspaceContext({ person, studio, role, workspace });
    const changed = { name: 'people.changed', data: { id: workspace.id } } as const;
    await queueLive(tx, inside, changed);
    await queueLiveToPeople(tx, inside, [personId], changed);
    await appendEntry(tx, inside, { action, subjectKind: 'person', subjectId: personId, detail });
  }
}
