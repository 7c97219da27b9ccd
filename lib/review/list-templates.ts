import { z } from 'zod';
import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { parseInput } from '@/lib/http/read-input';
import { decodeCursor, encodeCursor } from './cursor';
import { ListTemplatesInput, type TemplatePage } from './schemas';
import { countTemplates, pageOfTemplates } from './template-data';
import { summarise } from './template-summary';

const keyOf = {
  changed: z.string().regex(/^\d{4}-\d{2}-\d{2} [\d:.]+[+-][\d:]+$/),
  number: z.string().regex(/^\d{1,9}$/),
  title: z.string().max(200),
  due: z.iso.date(),
};

/** One page of the workspace's templates: searched, filtered and sorted by the database, five statements a page. */
export async function listTemplates(ctx: WorkspaceContext, input: unknown): Promise<TemplatePage> {
  requirePermission(ctx, 'workspace.read');
  const query = parseInput(ListTemplatesInput, input);
  const place = query.cursor
    ? decodeCursor(
        z.object({
          sort: z.literal(query.sort),
          direction: z.literal(query.direction),
          key: keyOf[query.sort],
          id: z.uuid(),
        }),
        query.cursor,
      )
    : null;
  return withTenant(ctx, async (tx) => {
    const rows = await pageOfTemplates(tx, ctx.workspace.id, { ...query, limit: query.limit + 1 }, place);
    const shown = rows.slice(0, query.limit);
    const last = shown.at(-1);
    const items = await summarise(
      tx,
      ctx,
      shown.map((row) => row.template),
    );
    const total = await countTemplates(tx, ctx.workspace.id, query);
    const nextCursor =
      rows.length > query.limit && last
        ? encodeCursor({
            sort: query.sort,
            direction: query.direction,
            key: last.key,
            id: last.template.id,
          })
        : null;
    return { items, nextCursor, total };
  });
}
