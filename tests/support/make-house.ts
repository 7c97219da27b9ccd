import { createHmac, randomBytes } from 'node:crypto';
import { hashPassword } from 'better-auth/crypto';
import { uuidv7 } from 'uuidv7';
import {
  personContext,
  type Person,
  type Studio,
  type StudioContext,
  type WorkspaceContext,
} from '@/lib/auth/context';
import { enterStudio, enterWorkspace } from '@/lib/auth/enter';
import { signInCookies } from '@/lib/auth/sign-in-cookies';
import { inviteToStudio } from '@/lib/studio/invite-to-studio';
import { openStudio } from '@/lib/studio/open-studio';
import { acceptInvitation } from '@/lib/workspaces/accept-invitation';
import { createWorkspace } from '@/lib/workspaces/create-workspace';
import { inviteToWorkspace } from '@/lib/workspaces/invite-to-workspace';
import type { ClientRole, Role, StudioRole } from '@/lib/workspaces/roles';
import type { FreshDatabase } from './database';

export const testPassword = 'eleven grey gulls over a harbour';

export interface SignedIn {
  person: Person;
  /** Value of the `cookie` header that carries the session. */
  cookie: string;
}

let made = 0;
const nextNumber = () => ++made;
let hashed: Promise<string> | undefined;

/**
 * A person with a proven address, the password of all test people and a session, who belongs nowhere yet.
 * Hashing a password is slow by design, so all of them share one hash.
 */
export async function makePerson(database: FreshDatabase, name: string): Promise<SignedIn> {
  const email = `${name.toLowerCase().replaceAll(/[^a-z]/g, '')}.${nextNumber()}@example.test`;
  const [id, token] = [uuidv7(), randomBytes(24).toString('base64url')];
  const password = await (hashed ??= hashPassword(testPassword));
  await database.query(
    `with person as (insert into users (id, name, email, email_verified, time_zone)
         values ($1, $2, $3, true, 'Europe/Lisbon')),
       account as (insert into accounts (id, account_id, provider_id, user_id, password)
         values (gen_random_uuid(), $1::text, 'credential', $1, $4))
     insert into sessions (id, user_id, token, expires_at) values (gen_random_uuid(), $1, $5, now() + interval '1 day')`,
    [id, name, email, password, token],
  );
  const person: Person = { id, name, email, units: 'mm', timeZone: 'Europe/Lisbon' };
  return { person, cookie: sessionCookie(token) };
}

/** The cookie as the identity service signs it: token and HMAC-SHA-256 of it under the secret. */
function sessionCookie(token: string): string {
  const signature = createHmac('sha256', process.env.BETTER_AUTH_SECRET!).update(token).digest('base64');
  return `firstpull.session_token=${encodeURIComponent(`${token}.${signature}`)}`;
}

/** Signs in with a password, for tests of just that. */
export async function signIn(email: string, password = testPassword): Promise<string> {
  const cookies = await signInCookies({ email, password }, new Headers());
  return cookies.map((cookie) => cookie.split(';')[0]).join('; ');
}

/** The token that was mailed for an invitation, as its outbox row carries it. */
export async function tokenOf(database: FreshDatabase, invitationId: string): Promise<string> {
  const { rows } = await database.query<{ path: string }>(
    "select payload->>'path' as path from outbox where dedupe_key = $1",
    [`invitation:${invitationId}`],
  );
  return rows[0].path.replace('/join/', '');
}

/** Somebody new who joined the studio by invitation. */
export async function joinStudio(
  database: FreshDatabase,
  lead: StudioContext,
  role: StudioRole,
): Promise<SignedIn> {
  const joined = await makePerson(database, `Staff ${role}`);
  const { id } = await inviteToStudio(lead, { email: joined.person.email, role });
  await acceptInvitation(joined.person, await tokenOf(database, id), {});
  return joined;
}

/** Somebody new who joined the workspace by invitation. */
export async function joinWorkspace(
  database: FreshDatabase,
  lead: WorkspaceContext,
  role: ClientRole,
): Promise<SignedIn> {
  const joined = await makePerson(database, `Client ${role}`);
  const { id } = await inviteToWorkspace(lead, { email: joined.person.email, role });
  await acceptInvitation(joined.person, await tokenOf(database, id), {});
  return joined;
}

export interface House {
  studio: Studio;
  workspace: { id: string; slug: string; name: string; code: string };
  /** One signed-in person in each role. */
  people: Record<Role, SignedIn>;
  /** A fresh context of a person in the workspace. */
  enter: (role: Role) => Promise<WorkspaceContext>;
  enterStudio: (role: StudioRole) => Promise<StudioContext>;
}

/** A studio with one workspace and a person in each of the five roles, all made by the product's own verbs. */
export async function makeHouse(database: FreshDatabase): Promise<House> {
  const n = nextNumber();
  const lead = await makePerson(database, `Lead ${n}`);
  const studio = await openStudio(personContext(lead.person), { name: `Studio ${n}` });
  const atStudio = await enterStudio(lead.person, studio.id);
  const workspace = await createWorkspace(atStudio, { name: `Client firm ${n}`, code: codeOf(n) });
  const inside = await enterWorkspace(lead.person, workspace.id);
  const people: Record<Role, SignedIn> = {
    lead,
    designer: await joinStudio(database, atStudio, 'designer'),
    producer: await joinStudio(database, atStudio, 'producer'),
    reviewer: await joinWorkspace(database, inside, 'reviewer'),
    approver: await joinWorkspace(database, inside, 'approver'),
  };
  return {
    studio,
    workspace,
    people,
    enter: (role) => enterWorkspace(people[role].person, workspace.id),
    enterStudio: (role) => enterStudio(people[role].person, studio.id),
  };
}

/** Three capitals for a number below 17,576. */
const codeOf = (n: number) =>
  [676, 26, 1].map((place) => String.fromCharCode(65 + (Math.floor(n / place) % 26))).join('');
