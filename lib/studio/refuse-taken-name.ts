import type { TenantTx } from '@/db/tenant';
import type { StudioContext } from '@/lib/auth/context';
import { conflict } from '@/lib/errors/app-error';
import { listShelf } from './library-data';
import type { LibraryKind } from './schemas';

/** @throws conflict `name-taken` when another item of the shelf has this name */
export async function refuseTakenName(
  tx: TenantTx,
  ctx: StudioContext,
  kind: LibraryKind,
  name: string,
  exceptId: string | null,
): Promise<void> {
  const shelf = await listShelf(tx, ctx.studio.id, kind);
  if (shelf.some((item) => item.name === name && item.id !== exceptId))
    throw conflict(
      'name-taken',
      `The studio's ${kind} already have one named “${name}”. Choose another name.`,
    );
}
