import type { TenantTx } from '@/db/tenant';
import type { WorkspaceContext } from '@/lib/auth/context';
import { formingHolds } from './gate-conditions';
import { workspacePeople } from './people-data';
import type { RevisionRow, TemplateRow } from './revision-data';
import { mailAbout } from './revision-mails';

/**
 * Tells those who were told of a revision that it is withdrawn: the studio's people heard of it when it was
 * posted, the client's when its check had ended with nothing failing left.
 */
export async function tellWithdrawn(
  tx: TenantTx,
  ctx: WorkspaceContext,
  { template, revision, reason }: { template: TemplateRow; revision: RevisionRow; reason: string },
  sides: ('studio' | 'client')[] = ['studio', 'client'],
): Promise<void> {
  const reachedClient = await formingHolds(tx, revision);
  const told = (await workspacePeople(tx, ctx.workspace.id)).filter(
    ({ side }) => sides.includes(side) && (side === 'studio' || reachedClient),
  );
  const about = { template, revision, occasion: `revision-withdrawn:${revision.id}` };
  await mailAbout(tx, ctx, told, about, (base) => ({
    template: 'revision-withdrawn',
    ...base,
    printedName: ctx.person.name,
    reason,
  }));
}
