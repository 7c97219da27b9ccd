import { withTenant } from '@/db/tenant';
import { requireStudioRole, type StudioContext } from '@/lib/auth/context';
import { notFound } from '@/lib/errors/app-error';
import { refuseStale } from '@/lib/http/if-match';
import { parseInput } from '@/lib/http/read-input';
import { lockLimits, updateLimits } from './library-data';
import { SetLimitsInput, type LibraryView } from './schemas';
import { insertStudioEntry } from './studio-data';

/** A lead moves the studio's limits; the change is recorded, and revisions posted before keep theirs. */
export async function setLimits(
  ctx: StudioContext,
  version: number,
  input: unknown,
): Promise<LibraryView['limits']> {
  requireStudioRole(ctx, 'lead');
  const { limits } = parseInput(SetLimitsInput, input);
  await withTenant(ctx, async (tx) => {
    const before = await lockLimits(tx, ctx.studio.id);
    if (!before) throw notFound('list of limits');
    refuseStale(before.version, version);
    await updateLimits(tx, ctx.studio.id, limits as Record<string, number>);
    await insertStudioEntry(tx, ctx, 'limits.set', { before: before.limits, after: limits });
  });
  return { moved: limits, version: version + 1 };
}
