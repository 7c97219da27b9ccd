import { and, asc, eq, inArray, isNotNull, ne, or } from 'drizzle-orm';
import { locks, packs, releases } from '@/db/schema/gates';
import { revisions, templates } from '@/db/schema/templates';
import { auditEntries } from '@/db/schema/trail';
import { gatePlans } from '@/db/schema/workspaces';
import type { TenantTx } from '@/db/tenant';
import type { AuditRow } from './data';

/** Every revision that is locked, or whose state says that it must be. */
export async function revisionsToVerify(tx: TenantTx, workspaceId: string) {
  return tx
    .select({ revision: revisions, number: templates.number, locked: locks.revisionId })
    .from(revisions)
    .innerJoin(
      templates,
      and(eq(templates.workspaceId, revisions.workspaceId), eq(templates.id, revisions.templateId)),
    )
    .leftJoin(locks, and(eq(locks.workspaceId, revisions.workspaceId), eq(locks.revisionId, revisions.id)))
    .where(
      and(
        eq(revisions.workspaceId, workspaceId),
        or(isNotNull(locks.revisionId), ne(revisions.state, 'in_review')),
      ),
    )
    .orderBy(asc(templates.number), asc(revisions.ordinal));
}

/** The entries that say what was done with one revision, its release and its pack. */
export async function entriesAbout(
  tx: TenantTx,
  workspaceId: string,
  subjectIds: string[],
): Promise<AuditRow[]> {
  return tx
    .select()
    .from(auditEntries)
    .where(and(eq(auditEntries.workspaceId, workspaceId), inArray(auditEntries.subjectId, subjectIds)))
    .orderBy(asc(auditEntries.seq));
}

/** Subjects that the chain says were locked or released, whether or not their rows are still there. */
export async function subjectsOf(tx: TenantTx, workspaceId: string, action: string) {
  return tx
    .select({ seq: auditEntries.seq, subjectId: auditEntries.subjectId, detail: auditEntries.detail })
    .from(auditEntries)
    .where(and(eq(auditEntries.workspaceId, workspaceId), eq(auditEntries.action, action)))
    .orderBy(asc(auditEntries.seq));
}

export async function plansOf(tx: TenantTx, workspaceId: string) {
  return tx
    .select({ id: gatePlans.id, number: gatePlans.number, gates: gatePlans.gates })
    .from(gatePlans)
    .where(eq(gatePlans.workspaceId, workspaceId))
    .orderBy(asc(gatePlans.number));
}

export async function releaseWithPack(tx: TenantTx, workspaceId: string, revisionId: string) {
  const [row] = await tx
    .select({ release: releases, pack: packs })
    .from(releases)
    .leftJoin(packs, and(eq(packs.workspaceId, releases.workspaceId), eq(packs.releaseId, releases.id)))
    .where(and(eq(releases.workspaceId, workspaceId), eq(releases.revisionId, revisionId)));
  return row ?? null;
}
