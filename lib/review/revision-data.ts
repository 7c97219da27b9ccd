import { and, asc, count, desc, eq, inArray, lt, sql } from 'drizzle-orm';
import { signatures } from '@/db/schema/gates';
import { checkRuns } from '@/db/schema/checks';
import { gatePlans } from '@/db/schema/workspaces';
import { meshes, recipes, revisions, templates } from '@/db/schema/templates';
import type { TenantTx } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { workspaceIdOf, type JobContext, type WorkspaceContext } from '@/lib/auth/context';
import { notFound } from '@/lib/errors/app-error';
import { queueLive } from '@/lib/jobs/queue-live';
import { standingRevision } from './standing';

export type TemplateRow = typeof templates.$inferSelect;
export type RevisionRow = typeof revisions.$inferSelect;
export type MeshRow = typeof meshes.$inferSelect;
export type RecipeRow = typeof recipes.$inferSelect;
export type Standing = RevisionRow['state'];

export async function findRevision(
  tx: TenantTx,
  workspaceId: string,
  revisionId: string,
): Promise<RevisionRow> {
  const [row] = await tx
    .select()
    .from(revisions)
    .where(and(eq(revisions.workspaceId, workspaceId), eq(revisions.id, revisionId)));
  if (!row) throw notFound('revision');
  return row;
}

export async function findRevisionByLetter(
  tx: TenantTx,
  workspaceId: string,
  templateId: string,
  letter: string,
): Promise<RevisionRow> {
  const [row] = await tx
    .select()
    .from(revisions)
    .where(
      and(
        eq(revisions.workspaceId, workspaceId),
        eq(revisions.templateId, templateId),
        eq(revisions.letter, letter),
      ),
    );
  if (!row) throw notFound('revision');
  return row;
}

/** Locks the template row: first of every command about its revisions (template → revision → gate → head). */
export async function lockTemplate(
  tx: TenantTx,
  workspaceId: string,
  templateId: string,
): Promise<TemplateRow> {
  const [row] = await tx
    .select()
    .from(templates)
    .where(and(eq(templates.workspaceId, workspaceId), eq(templates.id, templateId)))
    .for('update');
  if (!row) throw notFound('template');
  return row;
}

/** Locks the template, then the revision, and returns both as they stand under the lock. */
export async function lockRevision(
  tx: TenantTx,
  workspaceId: string,
  revisionId: string,
): Promise<{ template: TemplateRow; revision: RevisionRow }> {
  const { templateId } = await findRevision(tx, workspaceId, revisionId);
  const template = await lockTemplate(tx, workspaceId, templateId);
  const [revision] = await tx
    .select()
    .from(revisions)
    .where(and(eq(revisions.workspaceId, workspaceId), eq(revisions.id, revisionId)))
    .for('update');
  return { template, revision };
}

/** Everything frozen that a revision stands on. */
export async function loadRevisionParts(
  tx: TenantTx,
  revision: RevisionRow,
): Promise<{ template: TemplateRow; mesh: MeshRow; recipe: RecipeRow; gatePlanNumber: number }> {
  const [row] = await tx
    .select({ template: templates, mesh: meshes, recipe: recipes, gatePlanNumber: gatePlans.number })
    .from(revisions)
    .innerJoin(
      templates,
      and(eq(templates.workspaceId, revisions.workspaceId), eq(templates.id, revisions.templateId)),
    )
    .innerJoin(meshes, and(eq(meshes.workspaceId, revisions.workspaceId), eq(meshes.id, revisions.meshId)))
    .innerJoin(
      recipes,
      and(eq(recipes.workspaceId, revisions.workspaceId), eq(recipes.id, revisions.recipeId)),
    )
    .innerJoin(
      gatePlans,
      and(eq(gatePlans.workspaceId, revisions.workspaceId), eq(gatePlans.id, revisions.gatePlanId)),
    )
    .where(and(eq(revisions.workspaceId, revision.workspaceId), eq(revisions.id, revision.id)));
  return row;
}

/** Revisions of a template, oldest first, with the verdict of each. */
export async function revisionsOf(tx: TenantTx, workspaceId: string, templateId: string) {
  return tx
    .select({ revision: revisions, verdict: checkRuns.verdict })
    .from(revisions)
    .leftJoin(
      checkRuns,
      and(eq(checkRuns.workspaceId, revisions.workspaceId), eq(checkRuns.revisionId, revisions.id)),
    )
    .where(and(eq(revisions.workspaceId, workspaceId), eq(revisions.templateId, templateId)))
    .orderBy(asc(revisions.ordinal));
}

export async function latestRevision(
  tx: TenantTx,
  workspaceId: string,
  templateId: string,
): Promise<RevisionRow | null> {
  const [row] = await tx
    .select()
    .from(revisions)
    .where(and(eq(revisions.workspaceId, workspaceId), eq(revisions.templateId, templateId)))
    .orderBy(desc(revisions.ordinal))
    .limit(1);
  return row ?? null;
}

export async function insertRevision(tx: TenantTx, row: typeof revisions.$inferInsert): Promise<RevisionRow> {
  const [made] = await tx.insert(revisions).values(row).returning();
  return made;
}

export async function insertRecipe(tx: TenantTx, row: typeof recipes.$inferInsert): Promise<RecipeRow> {
  const [made] = await tx.insert(recipes).values(row).returning();
  return made;
}

/** How many people have put their name to a revision, returning it included. */
export async function countSignatures(
  tx: TenantTx,
  workspaceId: string,
  revisionId: string,
): Promise<number> {
  const [row] = await tx
    .select({ n: count() })
    .from(signatures)
    .where(and(eq(signatures.workspaceId, workspaceId), eq(signatures.revisionId, revisionId)));
  return row.n;
}

/** The template's list columns follow its revisions: the one that counts, and the newest. */
export async function followRevisions(
  tx: TenantTx,
  template: { workspaceId: string; id: string },
): Promise<void> {
  const all = await tx
    .select({
      id: revisions.id,
      letter: revisions.letter,
      ordinal: revisions.ordinal,
      state: revisions.state,
    })
    .from(revisions)
    .where(and(eq(revisions.workspaceId, template.workspaceId), eq(revisions.templateId, template.id)))
    .orderBy(desc(revisions.ordinal));
  const [latest] = all;
  const counts = standingRevision(all);
  if (!latest || !counts) return;
  await tx
    .update(templates)
    .set({
      latestRevisionId: latest.id,
      latestLetter: latest.letter,
      latestStanding: latest.state,
      standingRevisionId: counts.id,
      standingLetter: counts.letter,
      standing: counts.state,
      changedAt: sql`clock_timestamp()`,
    })
    .where(and(eq(templates.workspaceId, template.workspaceId), eq(templates.id, template.id)));
}

async function setState(
  tx: TenantTx,
  revision: RevisionRow,
  to: Standing,
  reason: string | null,
): Promise<RevisionRow> {
  const [moved] = await tx
    .update(revisions)
    .set({
      state: to,
      stateReason: reason,
      stateAt: sql`clock_timestamp()`,
      version: sql`${revisions.version} + 1`,
    })
    .where(and(eq(revisions.workspaceId, revision.workspaceId), eq(revisions.id, revision.id)))
    .returning();
  return moved;
}

/**
 * Moves a revision along its life; the only writer of `revisions.state`. The caller holds the template's and
 * the revision's row. Keeps the template's list columns right, and supersedes older approved or released
 * revisions when one is approved. Steps that the life does not have are refused by the database (conflict).
 */
export async function moveRevision(
  tx: TenantTx,
  ctx: WorkspaceContext | JobContext,
  revision: RevisionRow,
  to: Standing,
  reason: string | null,
): Promise<RevisionRow> {
  const workspaceId = workspaceIdOf(ctx);
  const moved = await setState(tx, revision, to, reason);
  const older =
    to === 'approved'
      ? await tx
          .select()
          .from(revisions)
          .where(
            and(
              eq(revisions.workspaceId, workspaceId),
              eq(revisions.templateId, revision.templateId),
              lt(revisions.ordinal, revision.ordinal),
              inArray(revisions.state, ['approved', 'released']),
            ),
          )
          .orderBy(asc(revisions.ordinal))
          .for('update')
      : [];
  const superseded: RevisionRow[] = [];
  for (const row of older)
    superseded.push(await setState(tx, row, 'superseded', `Superseded by ${moved.letter}.`));
  await followRevisions(tx, { workspaceId, id: revision.templateId });
  for (const row of superseded)
    await appendEntry(tx, ctx, {
      action: 'revision.superseded',
      subjectKind: 'revision',
      subjectId: row.id,
      detail: { templateId: row.templateId, letter: row.letter, by: moved.letter },
    });
  await queueLive(
    tx,
    ctx,
    ...[moved, ...superseded].map((row) => ({
      name: 'revision.changed' as const,
      data: { id: row.id, templateId: row.templateId, version: row.version },
    })),
    { name: 'template.changed', data: { id: revision.templateId } },
  );
  return moved;
}
