import { withTenant } from '@/db/tenant';
import type { PersonContext } from '@/lib/auth/context';
import { tell, templateOf } from './activity-words';
import type { Standing } from './schemas';
import type { TodayItem, TodayView } from './today-schemas';
import {
  findingsToMend,
  gatesToSign,
  itemsToSettle,
  mentionsToAnswer,
  notesToAnswer,
  numbersAcross,
  openDrafts,
  recentEntries,
  returnedRevisions,
  revisionsToRelease,
} from './today-data';

type Row = {
  workspaceName: string;
  workspaceSlug: string;
  templateId: string;
  number: string;
  title: string;
  dueOn: string | null;
  standing: Standing;
  letter?: string;
  since: Date | null;
};

const recentShown = 20;
const counted = (n: number, one: string, many: string) => (n === 1 ? `One ${one}` : `${n} ${many}`);

const said = (row: { authorName: string; text: string }) => `${row.authorName}: ${row.text.slice(0, 140)}`;

function item(kind: TodayItem['kind'], row: Row, text: string, page?: string): TodayItem {
  return {
    kind,
    workspace: { name: row.workspaceName, slug: row.workspaceSlug },
    templateNumber: row.number,
    templateTitle: row.title,
    letter: row.letter ?? null,
    path: `/w/${row.workspaceSlug}/templates/${row.templateId}/${page ?? row.letter ?? ''}`,
    text,
    since: (row.since ?? new Date(0)).toISOString(),
    dueOn: row.dueOn,
    standing: row.standing,
  };
}

/** What waits on a person, and since when, in every workspace that they belong to; the longest first. */
export async function viewToday(ctx: PersonContext): Promise<TodayView> {
  const me = ctx.person.id;
  return withTenant(ctx, async (tx) => {
    const items: TodayItem[] = [];
    for (const row of await gatesToSign(tx, me))
      items.push(
        // The gate's own day, where the plan sets one, comes before the template's: it can be late though an older
        // revision of the template is agreed.
        item(
          'sign',
          {
            ...row,
            dueOn: row.gateDueOn ?? row.dueOn,
            standing: row.gateDueOn ? 'in_review' : row.standing,
          },
          `Revision ${row.letter} waits for your name at ${row.gateName}${row.standsFor ? `, for ${row.standsFor}` : ''}`,
        ),
      );
    for (const row of await itemsToSettle(tx, me))
      items.push(
        item('settle', row, `${counted(row.n, 'item', 'items')} must be settled on revision ${row.letter}`),
      );
    for (const row of await findingsToMend(tx, me))
      items.push(
        item(
          'fix',
          row,
          `${counted(row.n, 'check fails', 'checks fail')} on revision ${row.letter}; post the next one or have it waived`,
        ),
      );
    for (const row of await returnedRevisions(tx, me))
      items.push(
        item('fix', row, `Revision ${row.letter} was returned: ${(row.reason ?? '').slice(0, 140)}`),
      );
    for (const row of await revisionsToRelease(tx, me))
      items.push(item('release', row, `Revision ${row.letter} is approved and can be released`));
    const named = new Set<string>();
    for (const row of await mentionsToAnswer(tx, me)) {
      if (named.has(row.threadId)) continue;
      named.add(row.threadId);
      items.push(item('mention', row, said(row)));
    }
    for (const row of await notesToAnswer(tx, me))
      if (!named.has(row.threadId)) items.push(item('answer', row, said(row)));
    for (const row of await openDrafts(tx, me))
      items.push(item('draft', row, 'Your draft is not posted yet', 'post'));
    items.sort((a, b) => (a.since < b.since ? -1 : a.since > b.since ? 1 : 0));

    const lately = await recentEntries(tx, me, recentShown);
    const ids = [...new Set(lately.flatMap(({ entry }) => templateOf(entry) ?? []))];
    const numbers = await numbersAcross(tx, me, ids);
    const recent = lately.map(({ entry, workspaceName, workspaceSlug }) => {
      const number = numbers.get(templateOf(entry) ?? '') ?? 'a template';
      const told = tell(entry, { slug: workspaceSlug, number });
      return {
        workspace: workspaceName,
        text: `${entry.actorName} ${told.text}`,
        path: told.path ?? `/w/${workspaceSlug}`,
        at: entry.at.toISOString(),
      };
    });
    return { items, recent };
  });
}
