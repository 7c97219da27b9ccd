import { withTenant } from '@/db/tenant';
import { requireStudioRole, type StudioContext } from '@/lib/auth/context';
import { notFound } from '@/lib/errors/app-error';
import { refuseStale } from '@/lib/http/if-match';
import { parseInput } from '@/lib/http/read-input';
import { clearDefault, lockItem, updateItem } from './library-data';
import { refuseTakenName } from './refuse-taken-name';
import { libraryInputs, type LibraryInput, type LibraryItem, type LibraryKind } from './schemas';
import { insertStudioEntry } from './studio-data';

/** Changes an item that the caller has seen at `version`. Posted recipes keep the values they were posted with. */
export async function changeLibraryItem<K extends LibraryKind>(
  ctx: StudioContext,
  kind: K,
  id: string,
  version: number,
  input: unknown,
): Promise<LibraryItem<K>> {
  requireStudioRole(ctx, 'lead', 'producer');
  const given = parseInput(libraryInputs[kind], input) as LibraryInput<K>;
  await withTenant(ctx, async (tx) => {
    const before = await lockItem(tx, ctx.studio.id, kind, id);
    if (!before) throw notFound('item');
    refuseStale(before.version, version);
    await refuseTakenName(tx, ctx, kind, given.name, id);
    if (given.isDefault && !before.isDefault) await clearDefault(tx, ctx.studio.id, kind);
    await updateItem(tx, ctx.studio.id, kind, id, given);
    await insertStudioEntry(tx, ctx, 'library.changed', { kind, id, before, after: given });
  });
  return { ...given, id, version: version + 1 } as unknown as LibraryItem<K>;
}
