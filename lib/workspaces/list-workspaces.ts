import { withTenant } from '@/db/tenant';
import type { StudioContext } from '@/lib/auth/context';
import type { WorkspaceView } from './schemas';
import { listStudioWorkspaces } from './workspaces-data';

/** All workspaces of a studio, for its staff, by name. */
export async function listWorkspaces(ctx: StudioContext): Promise<{ workspaces: WorkspaceView[] }> {
  const rows = await withTenant(ctx, (tx) => listStudioWorkspaces(tx, ctx.studio.id));
  return {
    workspaces: rows.map((row) => ({
      id: row.id,
      name: row.name,
      slug: row.slug,
      code: row.code,
      timeZone: row.timeZone,
      templates: row.templateCount,
      clients: row.clients,
      pendingInvitations: row.pending,
      openedAt: row.createdAt.toISOString(),
    })),
  };
}
