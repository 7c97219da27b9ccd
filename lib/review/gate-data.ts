import { and, asc, desc, eq, inArray, sql } from 'drizzle-orm';
import { gates, locks, signatures } from '@/db/schema/gates';
import { meshes, revisions, templates } from '@/db/schema/templates';
import { gatePlans, workspaces } from '@/db/schema/workspaces';
import type { TenantTx } from '@/db/tenant';
import { notFound } from '@/lib/errors/app-error';

export type GateRow = typeof gates.$inferSelect;
export type SignatureRow = typeof signatures.$inferSelect;
export type LockRow = typeof locks.$inferSelect;
export type GatePlanRow = typeof gatePlans.$inferSelect;

export async function newestGatePlan(tx: TenantTx, workspaceId: string): Promise<GatePlanRow | null> {
  const [row] = await tx
    .select()
    .from(gatePlans)
    .where(eq(gatePlans.workspaceId, workspaceId))
    .orderBy(desc(gatePlans.number))
    .limit(1);
  return row ?? null;
}

export async function insertGates(tx: TenantTx, rows: (typeof gates.$inferInsert)[]): Promise<void> {
  if (rows.length) await tx.insert(gates).values(rows);
}

export async function findGate(tx: TenantTx, workspaceId: string, gateId: string): Promise<GateRow> {
  const [row] = await tx
    .select()
    .from(gates)
    .where(and(eq(gates.workspaceId, workspaceId), eq(gates.id, gateId)));
  if (!row) throw notFound('gate');
  return row;
}

/** Open gates that people sign, of revisions in review, with whose revision it is. */
export async function openPeopleGates(tx: TenantTx, workspaceId: string) {
  return tx
    .select({ gate: gates, revision: revisions, template: templates, meshBy: meshes.createdBy })
    .from(gates)
    .innerJoin(
      revisions,
      and(eq(revisions.workspaceId, gates.workspaceId), eq(revisions.id, gates.revisionId)),
    )
    .innerJoin(
      templates,
      and(eq(templates.workspaceId, revisions.workspaceId), eq(templates.id, revisions.templateId)),
    )
    .innerJoin(meshes, and(eq(meshes.workspaceId, revisions.workspaceId), eq(meshes.id, revisions.meshId)))
    .where(
      and(
        eq(gates.workspaceId, workspaceId),
        eq(gates.state, 'open'),
        eq(revisions.state, 'in_review'),
        sql`${gates.rule}->>'kind' = 'people'`,
      ),
    )
    .orderBy(asc(gates.id));
}
export type OpenGateRow = Awaited<ReturnType<typeof openPeopleGates>>[number];

/** The gates of a revision in order; with `lock` their rows are held until commit (template and revision first). */
export async function gatesOf(
  tx: TenantTx,
  workspaceId: string,
  revisionId: string,
  options: { lock?: boolean } = {},
): Promise<GateRow[]> {
  const query = tx
    .select()
    .from(gates)
    .where(and(eq(gates.workspaceId, workspaceId), eq(gates.revisionId, revisionId)))
    .orderBy(asc(gates.ordinal));
  return options.lock ? query.for('update') : query;
}

/** So many days after today, where the workspace is; none for a gate without a due day. */
const dueOn = ({ workspaceId, rule }: GateRow) =>
  rule.dueDays
    ? sql<string>`(select (clock_timestamp() at time zone w.time_zone)::date + ${rule.dueDays}::int
        from ${workspaces} w where w.id = ${workspaceId})`
    : null;

export async function changeGate(
  tx: TenantTx,
  gate: GateRow,
  state: 'open' | 'passed' | 'returned',
): Promise<GateRow> {
  const at = sql`clock_timestamp()`;
  const [row] = await tx
    .update(gates)
    .set({
      state,
      version: sql`${gates.version} + 1`,
      ...(state === 'open' ? { openedAt: at, dueOn: dueOn(gate) } : {}),
      ...(state === 'passed' ? { passedAt: at } : {}),
    })
    .where(and(eq(gates.workspaceId, gate.workspaceId), eq(gates.id, gate.id)))
    .returning();
  return row;
}

/** Whatever has not passed will not be asked any more. */
export async function closeGates(tx: TenantTx, workspaceId: string, revisionId: string): Promise<void> {
  await tx
    .update(gates)
    .set({ state: 'closed', version: sql`${gates.version} + 1` })
    .where(
      and(
        eq(gates.workspaceId, workspaceId),
        eq(gates.revisionId, revisionId),
        inArray(gates.state, ['waiting', 'open']),
      ),
    );
}

export async function signaturesOf(
  tx: TenantTx,
  workspaceId: string,
  revisionId: string,
): Promise<SignatureRow[]> {
  return tx
    .select()
    .from(signatures)
    .where(and(eq(signatures.workspaceId, workspaceId), eq(signatures.revisionId, revisionId)))
    .orderBy(asc(signatures.signedAt), asc(signatures.id));
}

/** Puts a name to the content. The time is the database's own, at the write. */
export async function insertSignature(
  tx: TenantTx,
  row: Omit<typeof signatures.$inferInsert, 'signedAt'>,
): Promise<SignatureRow> {
  const [made] = await tx
    .insert(signatures)
    .values({ ...row, signedAt: sql`clock_timestamp()` as unknown as Date })
    .returning();
  return made;
}

export async function findLock(
  tx: TenantTx,
  workspaceId: string,
  revisionId: string,
): Promise<LockRow | null> {
  const [row] = await tx
    .select()
    .from(locks)
    .where(and(eq(locks.workspaceId, workspaceId), eq(locks.revisionId, revisionId)));
  return row ?? null;
}

/** Digest and time of a lock without its content, which may be large. */
export async function findLockDigest(tx: TenantTx, workspaceId: string, revisionId: string) {
  const [row] = await tx
    .select({ contentDigest: locks.contentDigest, lockedAt: locks.lockedAt })
    .from(locks)
    .where(and(eq(locks.workspaceId, workspaceId), eq(locks.revisionId, revisionId)));
  return row ?? null;
}

export async function insertLock(
  tx: TenantTx,
  row: Omit<typeof locks.$inferInsert, 'lockedAt'>,
): Promise<void> {
  await tx.insert(locks).values({ ...row, lockedAt: sql`clock_timestamp()` as unknown as Date });
}
