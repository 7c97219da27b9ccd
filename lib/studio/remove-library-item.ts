import { withTenant } from '@/db/tenant';
import { requireStudioRole, type StudioContext } from '@/lib/auth/context';
import { notFound } from '@/lib/errors/app-error';
import { refuseStale } from '@/lib/http/if-match';
import { deleteItem, lockItem } from './library-data';
import type { LibraryKind } from './schemas';
import { insertStudioEntry } from './studio-data';

/** Takes an item off the studio's shelf. Recipes hold copies of its values, so nothing posted changes. */
export async function removeLibraryItem(
  ctx: StudioContext,
  kind: LibraryKind,
  id: string,
  version: number,
): Promise<void> {
  requireStudioRole(ctx, 'lead', 'producer');
  await withTenant(ctx, async (tx) => {
    const item = await lockItem(tx, ctx.studio.id, kind, id);
    if (!item) throw notFound('item');
    refuseStale(item.version, version);
    await deleteItem(tx, ctx.studio.id, kind, id);
    await insertStudioEntry(tx, ctx, 'library.removed', { kind, id, item });
  });
}
