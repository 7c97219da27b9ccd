import { withTenant } from '@/db/tenant';
import type { StudioContext } from '@/lib/auth/context';
import { listShelf, readLimits } from './library-data';
import type { LibraryView } from './schemas';

/** The studio's machines, printers, sheets, filaments and moved limits, for all of its staff. */
export async function readLibrary(ctx: StudioContext): Promise<LibraryView> {
  return withTenant(ctx, async (tx) => {
    const limits = await readLimits(tx, ctx.studio.id);
    return {
      machines: await listShelf(tx, ctx.studio.id, 'machines'),
      printers: await listShelf(tx, ctx.studio.id, 'printers'),
      sheets: await listShelf(tx, ctx.studio.id, 'sheets'),
      filaments: await listShelf(tx, ctx.studio.id, 'filaments'),
      limits: { moved: limits?.limits ?? {}, version: limits?.version ?? 1 },
      mayChange: ctx.role !== 'designer',
      maySetLimits: ctx.role === 'lead',
    };
  });
}
