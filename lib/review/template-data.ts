import { and, asc, count, desc, eq, gt, ilike, inArray, lt, or, sql, type SQL } from 'drizzle-orm';
import { checkRuns, derivatives, findings, waivers } from '@/db/schema/checks';
import { placements, threads } from '@/db/schema/docket';
import { revisions, templates } from '@/db/schema/templates';
import { workspaces } from '@/db/schema/workspaces';
import type { TenantTx } from '@/db/tenant';
import { notFound } from '@/lib/errors/app-error';
import type { TemplateRow } from './revision-data';
import type { ListTemplatesInput } from './schemas';
import { onItsWay } from './standing';

/** The next serial of the workspace, gap-free: the workspace's row is held until commit. */
export async function nextSerial(
  tx: TenantTx,
  workspaceId: string,
): Promise<{ serial: number; code: string }> {
  const [row] = await tx
    .update(workspaces)
    .set({ templateCount: sql`${workspaces.templateCount} + 1` })
    .where(eq(workspaces.id, workspaceId))
    .returning({ serial: workspaces.templateCount, code: workspaces.code });
  return row;
}

export async function insertTemplate(tx: TenantTx, row: typeof templates.$inferInsert): Promise<TemplateRow> {
  const [made] = await tx.insert(templates).values(row).returning();
  return made;
}

export async function findTemplate(
  tx: TenantTx,
  workspaceId: string,
  templateId: string,
): Promise<TemplateRow> {
  const [row] = await tx
    .select()
    .from(templates)
    .where(and(eq(templates.workspaceId, workspaceId), eq(templates.id, templateId)));
  if (!row) throw notFound('template');
  return row;
}

/** Changes a template that is still at `version`; null when somebody changed it meanwhile. */
export async function updateTemplate(
  tx: TenantTx,
  template: { workspaceId: string; id: string; version: number },
  change: { title?: string; dueOn?: string | null },
): Promise<TemplateRow | null> {
  const [row] = await tx
    .update(templates)
    .set({ ...change, changedAt: sql`clock_timestamp()`, version: sql`${templates.version} + 1` })
    .where(
      and(
        eq(templates.workspaceId, template.workspaceId),
        eq(templates.id, template.id),
        eq(templates.version, template.version),
      ),
    )
    .returning();
  return row ?? null;
}

type Filter = Pick<ListTemplatesInput, 'search' | 'standing'>;
type Order = Pick<ListTemplatesInput, 'sort' | 'direction'>;
/** Where a page of the list ends: the sorted value as text, and the id that parts equals. */
export type ListPlace = { key: string; id: string };

const escaped = (text: string) => `%${text.replaceAll(/[\\%_]/g, (sign) => `\\${sign}`)}%`;

function matching(workspaceId: string, filter: Filter): SQL | undefined {
  const found = filter.search
    ? or(ilike(templates.title, escaped(filter.search)), ilike(templates.number, escaped(filter.search)))
    : undefined;
  const { standing } = filter;
  const newer = standing && onItsWay.includes(standing) ? eq(templates.latestStanding, standing) : undefined;
  const stands = standing ? or(eq(templates.standing, standing), newer) : undefined;
  return and(eq(templates.workspaceId, workspaceId), found, stands);
}

/** What a list is sorted by, and how its place is written. Templates without a due date come last either way. */
function sortedBy({ sort, direction }: Order): { value: SQL; read: (key: string) => SQL } {
  if (sort === 'number') return { value: sql`${templates.serial}`, read: (key) => sql`${Number(key)}::int` };
  if (sort === 'title') return { value: sql`lower(${templates.title})`, read: (key) => sql`${key}::text` };
  if (sort === 'due') {
    const last = direction === 'asc' ? '9999-12-31' : '0001-01-01';
    return {
      value: sql`coalesce(${templates.dueOn}, ${sql.raw(`date '${last}'`)})`,
      read: (key) => sql`${key}::date`,
    };
  }
  return { value: sql`${templates.changedAt}`, read: (key) => sql`${key}::timestamptz` };
}

export async function countTemplates(tx: TenantTx, workspaceId: string, filter: Filter): Promise<number> {
  const [row] = await tx.select({ n: count() }).from(templates).where(matching(workspaceId, filter));
  return row.n;
}

/** One page of the list after `place`, with the text of each row's sorted value for the next place. */
export async function pageOfTemplates(
  tx: TenantTx,
  workspaceId: string,
  query: Filter & Order & { limit: number },
  place: ListPlace | null,
): Promise<{ template: TemplateRow; key: string }[]> {
  const { value, read } = sortedBy(query);
  const up = query.direction === 'asc';
  const beyond = place
    ? or(
        (up ? gt : lt)(value, read(place.key)),
        and(eq(value, read(place.key)), (up ? gt : lt)(templates.id, place.id)),
      )
    : undefined;
  const order = up ? asc : desc;
  return tx
    .select({ template: templates, key: sql<string>`(${value})::text` })
    .from(templates)
    .where(and(matching(workspaceId, query), beyond))
    .orderBy(order(value), order(templates.id))
    .limit(query.limit);
}

/** Of each of these revisions: verdict, what must be settled, whether there is a small picture. */
export async function listFacts(tx: TenantTx, workspaceId: string, revisionIds: string[]) {
  const facts = new Map<
    string,
    { verdict: 'pass' | 'caution' | 'fail' | null; mustSettle: number; picture: boolean }
  >();
  if (!revisionIds.length) return facts;
  const runs = await tx
    .select({ id: revisions.id, verdict: checkRuns.verdict, picture: derivatives.id })
    .from(revisions)
    .leftJoin(
      checkRuns,
      and(eq(checkRuns.workspaceId, revisions.workspaceId), eq(checkRuns.revisionId, revisions.id)),
    )
    .leftJoin(
      derivatives,
      and(
        eq(derivatives.workspaceId, revisions.workspaceId),
        eq(derivatives.meshId, revisions.meshId),
        eq(derivatives.kind, 'thumbnail'),
      ),
    )
    .where(and(eq(revisions.workspaceId, workspaceId), inArray(revisions.id, revisionIds)));
  for (const run of runs)
    facts.set(run.id, { verdict: run.verdict, mustSettle: 0, picture: run.picture !== null });
  const failing = await tx
    .select({ id: findings.revisionId, n: count() })
    .from(findings)
    .leftJoin(waivers, and(eq(waivers.workspaceId, findings.workspaceId), eq(waivers.findingId, findings.id)))
    .where(
      and(
        eq(findings.workspaceId, workspaceId),
        inArray(findings.revisionId, revisionIds),
        eq(findings.status, 'fail'),
        sql`${waivers.id} is null`,
      ),
    )
    .groupBy(findings.revisionId);
  const open = await tx
    .select({ id: placements.revisionId, n: count() })
    .from(placements)
    .innerJoin(
      threads,
      and(eq(threads.workspaceId, placements.workspaceId), eq(threads.id, placements.threadId)),
    )
    .where(
      and(
        eq(placements.workspaceId, workspaceId),
        inArray(placements.revisionId, revisionIds),
        eq(threads.state, 'open'),
        eq(threads.mustSettle, true),
        eq(threads.afterApproval, false),
      ),
    )
    .groupBy(placements.revisionId);
  for (const row of [...failing, ...open]) {
    const fact = facts.get(row.id);
    if (fact) fact.mustSettle += row.n;
  }
  return facts;
}
