import { asc, desc, eq } from 'drizzle-orm';
import { filaments, machines, printers, sheets, studioLimits } from '@/db/schema/studio-library';
import type { TenantTx } from '@/db/tenant';

export type LibraryDefaults = {
  machine: typeof machines.$inferSelect | null;
  printer: typeof printers.$inferSelect | null;
  sheet: typeof sheets.$inferSelect | null;
  filament: typeof filaments.$inferSelect | null;
};

/** What the studio usually forms and prints with: the item marked as default, else the first by name. */
export async function libraryDefaults(tx: TenantTx, studioId: string): Promise<LibraryDefaults> {
  const [machine] = await tx
    .select()
    .from(machines)
    .where(eq(machines.studioId, studioId))
    .orderBy(desc(machines.isDefault), asc(machines.name))
    .limit(1);
  const [printer] = await tx
    .select()
    .from(printers)
    .where(eq(printers.studioId, studioId))
    .orderBy(desc(printers.isDefault), asc(printers.name))
    .limit(1);
  const [sheet] = await tx
    .select()
    .from(sheets)
    .where(eq(sheets.studioId, studioId))
    .orderBy(desc(sheets.isDefault), asc(sheets.name))
    .limit(1);
  const [filament] = await tx
    .select()
    .from(filaments)
    .where(eq(filaments.studioId, studioId))
    .orderBy(desc(filaments.isDefault), asc(filaments.name))
    .limit(1);
  return {
    machine: machine ?? null,
    printer: printer ?? null,
    sheet: sheet ?? null,
    filament: filament ?? null,
  };
}

/** Limits that the studio has moved; empty where it never did. */
export async function movedLimits(tx: TenantTx, studioId: string): Promise<Record<string, number>> {
  const [row] = await tx
    .select({ limits: studioLimits.limits })
    .from(studioLimits)
    .where(eq(studioLimits.studioId, studioId));
  return row?.limits ?? {};
}
