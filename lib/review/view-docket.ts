import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { asId } from './as-id';
import { viewDocketRows } from './docket-view';
import { loadDocket } from './load-docket';
import { findRevision } from './revision-data';
import type { DocketView } from './schemas';

/** Findings and threads that stand on a revision, with what must be settled before the next gate. */
export async function viewDocket(ctx: WorkspaceContext, revisionId: string): Promise<DocketView> {
  requirePermission(ctx, 'workspace.read');
  const id = asId(revisionId, 'revision');
  return withTenant(ctx, async (tx) => {
    await findRevision(tx, ctx.workspace.id, id);
    return viewDocketRows(id, await loadDocket(tx, ctx.workspace.id, id));
  });
}
