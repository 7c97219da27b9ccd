import { and, asc, eq, inArray, sql } from 'drizzle-orm';
import { uuidv7 } from 'uuidv7';
import { authDatabase } from '@/db/client';
import { accounts, sessions, users } from '@/db/schema/identity';
import { outbox } from '@/db/schema/trail';
import {
  invitations,
  members,
  studioInvitations,
  studioMembers,
  studios,
  workspaces,
} from '@/db/schema/workspaces';
import type { MailRequest } from '@/lib/mail/messages';

const uuid = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/;

/** The workspace named by slug or id, as this person is a member of it; null also where it does not exist. */
export async function findMembership(personId: string, workspace: string) {
  const named = uuid.test(workspace) ? eq(workspaces.id, workspace) : eq(workspaces.slug, workspace);
  const [row] = await authDatabase()
    .select({ role: members.role, workspace: workspaces, studio: studios })
    .from(members)
    .innerJoin(workspaces, eq(workspaces.id, members.workspaceId))
    .innerJoin(studios, eq(studios.id, workspaces.studioId))
    .where(and(eq(members.userId, personId), named));
  return row ?? null;
}

/** Every membership of a person with what a context needs, in the order of the workspaces' ids. */
export async function findMemberships(personId: string) {
  return authDatabase()
    .select({ role: members.role, workspace: workspaces, studio: studios })
    .from(members)
    .innerJoin(workspaces, eq(workspaces.id, members.workspaceId))
    .innerJoin(studios, eq(studios.id, workspaces.studioId))
    .where(eq(members.userId, personId))
    .orderBy(asc(workspaces.id));
}

export async function findStudioMembership(personId: string, studio: string) {
  const named = uuid.test(studio) ? eq(studios.id, studio) : eq(studios.slug, studio);
  const [row] = await authDatabase()
    .select({ role: studioMembers.role, studio: studios })
    .from(studioMembers)
    .innerJoin(studios, eq(studios.id, studioMembers.studioId))
    .where(and(eq(studioMembers.userId, personId), named));
  return row ?? null;
}

/** Everything that a person belongs to, for the switcher: studios with their role, workspaces with theirs. */
export async function listMemberships(personId: string) {
  const [ofStudios, ofWorkspaces] = await Promise.all([
    authDatabase()
      .select({ id: studios.id, name: studios.name, slug: studios.slug, role: studioMembers.role })
      .from(studioMembers)
      .innerJoin(studios, eq(studios.id, studioMembers.studioId))
      .where(eq(studioMembers.userId, personId))
      .orderBy(asc(studios.name)),
    authDatabase()
      .select({
        id: workspaces.id,
        name: workspaces.name,
        slug: workspaces.slug,
        studioName: studios.name,
        role: members.role,
      })
      .from(members)
      .innerJoin(workspaces, eq(workspaces.id, members.workspaceId))
      .innerJoin(studios, eq(studios.id, workspaces.studioId))
      .where(eq(members.userId, personId))
      .orderBy(asc(workspaces.name)),
  ]);
  return { studios: ofStudios, workspaces: ofWorkspaces };
}

export async function findPerson(personId: string) {
  const [row] = await authDatabase().select().from(users).where(eq(users.id, personId));
  return row ?? null;
}

/** The account of an address with the hash of its password; null where there is none. */
export async function findOwner(email: string): Promise<{ id: string; passwordHash: string } | null> {
  const [row] = await authDatabase()
    .select({ id: users.id, passwordHash: accounts.password })
    .from(users)
    .innerJoin(accounts, and(eq(accounts.userId, users.id), eq(accounts.providerId, 'credential')))
    .where(eq(sql`lower(${users.email})`, email.trim().toLowerCase()));
  return row?.passwordHash ? { id: row.id, passwordHash: row.passwordHash } : null;
}

export async function listSessionIds(personId: string): Promise<string[]> {
  const rows = await authDatabase()
    .select({ id: sessions.id })
    .from(sessions)
    .where(eq(sessions.userId, personId));
  return rows.map((row) => row.id);
}

/** An invitation of a client or of studio staff, with the names that its page shows. */
export async function findInvitation(id: string) {
  if (!uuid.test(id)) return null;
  const [client] = await authDatabase()
    .select({ invitation: invitations, workspace: workspaces, studio: studios })
    .from(invitations)
    .innerJoin(workspaces, eq(workspaces.id, invitations.workspaceId))
    .innerJoin(studios, eq(studios.id, workspaces.studioId))
    .where(eq(invitations.id, id));
  if (client) return { kind: 'workspace' as const, ...client };
  const [staff] = await authDatabase()
    .select({ invitation: studioInvitations, studio: studios })
    .from(studioInvitations)
    .innerJoin(studios, eq(studios.id, studioInvitations.studioId))
    .where(eq(studioInvitations.id, id));
  return staff ? { kind: 'studio' as const, ...staff } : null;
}

/** Whether a person is a client in any workspace of a studio; asked before they may become its staff. */
export async function isClientOfStudio(personId: string, studioId: string): Promise<boolean> {
  const rows = await authDatabase()
    .select({ id: members.id })
    .from(members)
    .innerJoin(workspaces, eq(workspaces.id, members.workspaceId))
    .where(
      and(
        eq(members.userId, personId),
        eq(workspaces.studioId, studioId),
        inArray(members.role, ['reviewer', 'approver']),
      ),
    )
    .limit(1);
  return rows.length > 0;
}

export type PersonChange = { name?: string; units?: 'mm' | 'in'; timeZone?: string };

/** Changes what a person may change of themselves. */
export async function updatePerson(personId: string, change: PersonChange): Promise<void> {
  await authDatabase()
    .update(users)
    .set({ ...change, updatedAt: new Date() })
    .where(eq(users.id, personId));
}

/** Mails of identity belong to no tenant; they leave through the same outbox. */
export async function queueIdentityMail(request: MailRequest): Promise<void> {
  await authDatabase()
    .insert(outbox)
    .values({ kind: 'mail', payload: request as never, dedupeKey: uuidv7() });
}

/** Every workspace of every studio, for work that goes through all of them (the audit's verifier). */
export async function listAllWorkspaces(): Promise<{ id: string; name: string; slug: string }[]> {
  return authDatabase()
    .select({ id: workspaces.id, name: workspaces.name, slug: workspaces.slug })
    .from(workspaces)
    .orderBy(asc(workspaces.slug));
}
