import { z } from 'zod';
import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { parseInput } from '@/lib/http/read-input';
import { entriesBefore, templateNumbers } from './activity-data';
import { actionsAbout } from './activity-topics';
import { tell, templateOf } from './activity-words';
import { decodeCursor, encodeCursor } from './cursor';
import { ListActivityInput, type ActivityPage } from './schemas';

/** The workspace's audit chain in plain words, newest first; of one topic or of one person where asked. */
export async function listActivity(ctx: WorkspaceContext, input: unknown): Promise<ActivityPage> {
  requirePermission(ctx, 'activity.read');
  const { cursor, limit, about, by } = parseInput(ListActivityInput, input);
  const before = cursor ? decodeCursor(z.object({ seq: z.number().int() }), cursor).seq : null;
  const workspaceId = ctx.workspace.id;
  return withTenant(ctx, async (tx) => {
    const filter = { before, actions: about ? actionsAbout(about) : null, actorId: by ?? null };
    const rows = await entriesBefore(tx, workspaceId, filter, limit + 1);
    const shown = rows.slice(0, limit);
    const ids = [...new Set(shown.flatMap((entry) => templateOf(entry) ?? []))];
    const numbers = await templateNumbers(tx, workspaceId, ids);
    const items = shown.map((entry) => {
      const number = numbers.get(templateOf(entry) ?? '') ?? 'a template';
      const told = tell(entry, { slug: ctx.workspace.slug, number });
      return {
        seq: entry.seq,
        at: entry.at.toISOString(),
        actorId: entry.actorId,
        actorName: entry.actorName,
        action: entry.action,
        text: told.text,
        path: told.path,
        hash: entry.hash,
      };
    });
    const last = shown.at(-1);
    return { items, nextCursor: rows.length > limit && last ? encodeCursor({ seq: last.seq }) : null };
  });
}
