import { and, asc, eq, sql } from 'drizzle-orm';
import { filaments, machines, printers, sheets, studioLimits } from '@/db/schema/studio-library';
import type { TenantTx } from '@/db/tenant';
import type { LibraryInput, LibraryItem, LibraryKind } from './schemas';

const tables = { machines, printers, sheets, filaments };
/** The four shelves share id, studio, version and default; drizzle cannot type a union of tables. */
const shelf = (kind: LibraryKind) => tables[kind] as typeof machines;

export async function listShelf<K extends LibraryKind>(
  tx: TenantTx,
  studioId: string,
  kind: K,
): Promise<LibraryItem<K>[]> {
  const table = shelf(kind);
  const rows = await tx
    .select()
    .from(table)
    .where(eq(table.studioId, studioId))
    .orderBy(asc(table.name), asc(table.id));
  return rows.map(({ studioId: _studio, createdAt: _made, ...item }) => item) as unknown as LibraryItem<K>[];
}

/** Locks one item for the rest of the transaction. */
export async function lockItem(tx: TenantTx, studioId: string, kind: LibraryKind, id: string) {
  const table = shelf(kind);
  const [row] = await tx
    .select()
    .from(table)
    .where(and(eq(table.studioId, studioId), eq(table.id, id)))
    .for('update');
  if (!row) return null;
  const { studioId: _studio, createdAt: _made, ...item } = row;
  return item as unknown as LibraryItem;
}

export async function insertItem<K extends LibraryKind>(
  tx: TenantTx,
  kind: K,
  row: LibraryInput<K> & { id: string; studioId: string },
): Promise<void> {
  await tx.insert(shelf(kind)).values(row as never);
}

export async function updateItem<K extends LibraryKind>(
  tx: TenantTx,
  studioId: string,
  kind: K,
  id: string,
  change: Partial<LibraryInput<K>>,
): Promise<void> {
  const table = shelf(kind);
  await tx
    .update(table)
    .set({ ...(change as object), version: sql`${table.version} + 1` })
    .where(and(eq(table.studioId, studioId), eq(table.id, id)));
}

export async function deleteItem(tx: TenantTx, studioId: string, kind: LibraryKind, id: string) {
  const table = shelf(kind);
  await tx.delete(table).where(and(eq(table.studioId, studioId), eq(table.id, id)));
}

/** Leaves no default on a shelf, before another item takes that place. */
export async function clearDefault(tx: TenantTx, studioId: string, kind: LibraryKind): Promise<void> {
  const table = shelf(kind);
  await tx
    .update(table)
    .set({ isDefault: false, version: sql`${table.version} + 1` })
    .where(and(eq(table.studioId, studioId), eq(table.isDefault, true)));
}

export async function insertLimits(tx: TenantTx, studioId: string): Promise<void> {
  await tx.insert(studioLimits).values({ studioId, limits: {} });
}

export async function readLimits(tx: TenantTx, studioId: string) {
  const [row] = await tx.select().from(studioLimits).where(eq(studioLimits.studioId, studioId));
  return row ?? null;
}

export async function lockLimits(tx: TenantTx, studioId: string) {
  const [row] = await tx.select().from(studioLimits).where(eq(studioLimits.studioId, studioId)).for('update');
  return row ?? null;
}

export async function updateLimits(
  tx: TenantTx,
  studioId: string,
  limits: Record<string, number>,
): Promise<void> {
  await tx
    .update(studioLimits)
    .set({ limits, version: sql`${studioLimits.version} + 1` })
    .where(eq(studioLimits.studioId, studioId));
}
