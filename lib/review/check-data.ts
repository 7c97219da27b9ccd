import { and, asc, eq, inArray, sql } from 'drizzle-orm';
import { checkRuns, derivatives, findings, jobs, reports } from '@/db/schema/checks';
import { meshes } from '@/db/schema/templates';
import type { TenantTx } from '@/db/tenant';

export type CheckRunRow = typeof checkRuns.$inferSelect;
export type ReportRow = typeof reports.$inferSelect;
export type FindingRow = typeof findings.$inferSelect;
export type DerivativeRow = typeof derivatives.$inferSelect;
export type JobView = typeof jobs.$inferSelect;

export async function findJob(tx: TenantTx, workspaceId: string, jobId: string): Promise<JobView | null> {
  const [row] = await tx
    .select()
    .from(jobs)
    .where(and(eq(jobs.workspaceId, workspaceId), eq(jobs.id, jobId)));
  return row ?? null;
}

export async function insertCheckRun(tx: TenantTx, row: typeof checkRuns.$inferInsert): Promise<void> {
  await tx.insert(checkRuns).values(row);
}

export async function findCheckRun(
  tx: TenantTx,
  workspaceId: string,
  revisionId: string,
): Promise<CheckRunRow | null> {
  const [row] = await tx
    .select()
    .from(checkRuns)
    .where(and(eq(checkRuns.workspaceId, workspaceId), eq(checkRuns.revisionId, revisionId)));
  return row ?? null;
}

export async function changeCheckRun(
  tx: TenantTx,
  run: CheckRunRow,
  change: Partial<Pick<CheckRunRow, 'state' | 'verdict' | 'reportId' | 'error' | 'jobId' | 'finishedAt'>> & {
    finished?: boolean;
  },
): Promise<void> {
  const { finished, ...fields } = change;
  await tx
    .update(checkRuns)
    .set({
      ...fields,
      ...(finished ? { finishedAt: sql`clock_timestamp()` } : {}),
      version: sql`${checkRuns.version} + 1`,
    })
    .where(and(eq(checkRuns.workspaceId, run.workspaceId), eq(checkRuns.id, run.id)));
}

/** The report for this input, if the engine has been asked before. */
export async function findReport(
  tx: TenantTx,
  workspaceId: string,
  input: { meshSha256: string; recipeDigest: string; engineVersion: string },
): Promise<ReportRow | null> {
  const [row] = await tx
    .select()
    .from(reports)
    .where(
      and(
        eq(reports.workspaceId, workspaceId),
        eq(reports.meshSha256, input.meshSha256),
        eq(reports.recipeDigest, input.recipeDigest),
        eq(reports.engineVersion, input.engineVersion),
      ),
    );
  return row ?? null;
}

/** Stores a report once; where the same input was answered before, the first answer stands. */
export async function keepReport(tx: TenantTx, row: typeof reports.$inferInsert): Promise<ReportRow> {
  await tx.insert(reports).values(row).onConflictDoNothing();
  const kept = await findReport(tx, row.workspaceId, row);
  if (!kept) throw new Error('the report is not visible to this transaction');
  return kept;
}

export async function findReportById(
  tx: TenantTx,
  workspaceId: string,
  reportId: string,
): Promise<ReportRow | null> {
  const [row] = await tx
    .select()
    .from(reports)
    .where(and(eq(reports.workspaceId, workspaceId), eq(reports.id, reportId)));
  return row ?? null;
}

/** Digest and version of a report without its body, which may be large. */
export async function findReportDigest(tx: TenantTx, workspaceId: string, reportId: string) {
  const [row] = await tx
    .select({ sha256: reports.sha256, engineVersion: reports.engineVersion })
    .from(reports)
    .where(and(eq(reports.workspaceId, workspaceId), eq(reports.id, reportId)));
  return row ?? null;
}

type HelpInReport = {
  engineVersion: string;
  advice: { text: string; mends: string[]; costS: number; costG: number }[] | null;
  life: string | null;
};

/** What a page says of a report besides its findings; reports of older engines have less. */
export async function findHelpInReport(
  tx: TenantTx,
  workspaceId: string,
  reportId: string,
): Promise<HelpInReport | null> {
  const [row] = await tx
    .select({
      engineVersion: reports.engineVersion,
      advice: sql<HelpInReport['advice']>`${reports.body}->'advice'`,
      life: sql<string | null>`${reports.body}->'life'->>'text'`,
    })
    .from(reports)
    .where(and(eq(reports.workspaceId, workspaceId), eq(reports.id, reportId)));
  return row ?? null;
}

export async function insertFindings(tx: TenantTx, rows: (typeof findings.$inferInsert)[]): Promise<void> {
  if (rows.length) await tx.insert(findings).values(rows);
}

export async function findingsOf(
  tx: TenantTx,
  workspaceId: string,
  revisionId: string,
): Promise<FindingRow[]> {
  return tx
    .select()
    .from(findings)
    .where(and(eq(findings.workspaceId, workspaceId), eq(findings.revisionId, revisionId)))
    .orderBy(asc(findings.ordinal));
}

export async function findFinding(
  tx: TenantTx,
  workspaceId: string,
  findingId: string,
): Promise<FindingRow | null> {
  const [row] = await tx
    .select()
    .from(findings)
    .where(and(eq(findings.workspaceId, workspaceId), eq(findings.id, findingId)));
  return row ?? null;
}

/** Which check each of these findings spoke of; for threads that were carried from another revision. */
export async function checksOfFindings(tx: TenantTx, workspaceId: string, findingIds: string[]) {
  if (!findingIds.length) return new Map<string, string>();
  const rows = await tx
    .select({ id: findings.id, checkId: findings.checkId })
    .from(findings)
    .where(and(eq(findings.workspaceId, workspaceId), inArray(findings.id, findingIds)));
  return new Map(rows.map((row) => [row.id, row.checkId]));
}

export async function findMesh(tx: TenantTx, workspaceId: string, meshId: string) {
  const [row] = await tx
    .select()
    .from(meshes)
    .where(and(eq(meshes.workspaceId, workspaceId), eq(meshes.id, meshId)));
  return row ?? null;
}

export async function insertMesh(tx: TenantTx, row: typeof meshes.$inferInsert): Promise<string> {
  const [made] = await tx.insert(meshes).values(row).returning({ id: meshes.id });
  return made.id;
}

/** What pages show of a mesh, and of the sheet formed over it under one recipe. */
export async function derivativesOf(
  tx: TenantTx,
  workspaceId: string,
  meshId: string,
  recipeDigest: string,
): Promise<DerivativeRow[]> {
  return tx
    .select()
    .from(derivatives)
    .where(
      and(
        eq(derivatives.workspaceId, workspaceId),
        eq(derivatives.meshId, meshId),
        inArray(derivatives.recipeDigest, ['', recipeDigest]),
      ),
    );
}

export async function keepDerivative(tx: TenantTx, row: typeof derivatives.$inferInsert): Promise<boolean> {
  const made = await tx
    .insert(derivatives)
    .values(row)
    .onConflictDoNothing()
    .returning({ id: derivatives.id });
  return made.length > 0;
}
