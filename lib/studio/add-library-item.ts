import { uuidv7 } from 'uuidv7';
import { withTenant } from '@/db/tenant';
import { requireStudioRole, type StudioContext } from '@/lib/auth/context';
import { parseInput } from '@/lib/http/read-input';
import { clearDefault, insertItem } from './library-data';
import { refuseTakenName } from './refuse-taken-name';
import { libraryInputs, type LibraryInput, type LibraryItem, type LibraryKind } from './schemas';
import { insertStudioEntry } from './studio-data';

/** Adds a machine, printer, sheet or filament to the studio's library. */
export async function addLibraryItem<K extends LibraryKind>(
  ctx: StudioContext,
  kind: K,
  input: unknown,
): Promise<LibraryItem<K>> {
  requireStudioRole(ctx, 'lead', 'producer');
  const given = parseInput(libraryInputs[kind], input) as LibraryInput<K>;
  const id = uuidv7();
  await withTenant(ctx, async (tx) => {
    await refuseTakenName(tx, ctx, kind, given.name, null);
    if (given.isDefault) await clearDefault(tx, ctx.studio.id, kind);
    await insertItem(tx, kind, { ...given, id, studioId: ctx.studio.id });
    await insertStudioEntry(tx, ctx, 'library.added', { kind, id, item: given });
  });
  return { ...given, id, version: 1 } as unknown as LibraryItem<K>;
}
