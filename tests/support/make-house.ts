import { POST as accept } from '@/app/api/v1/invitations/[invitation]/accept/route';
import { claimAddress } from '@/lib/auth/claim-address';
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
import { createWorkspace } from '@/lib/workspaces/create-workspace';
import { inviteToWorkspace } from '@/lib/workspaces/invite-to-workspace';
import type { ClientRole, Role, StudioRole } from '@/lib/workspaces/roles';
import { callRoute, cookieOf } from './call-route';
import type { FreshDatabase } from './database';

export const testPassword = 'eleven grey gulls over a harbour';

export interface SignedIn {
  person: Person;
  /** Value of the `cookie` header that carries the session. */
  cookie: string;
}

let made = 0;
const nextNumber = () => ++made;

/** A person with a proven address and a session, who belongs nowhere yet. */
export async function makePerson(name: string): Promise<SignedIn> {
  const email = `${name.toLowerCase().replaceAll(/[^a-z]/g, '')}.${nextNumber()}@example.test`;
  const person = await claimAddress({ email, name, password: testPassword });
  return { person, cookie: await signIn(email) };
}

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

async function acceptAs(database: FreshDatabase, invitationId: string, name: string): Promise<SignedIn> {
  const invitation = await tokenOf(database, invitationId);
  const answer = await callRoute(accept, { params: { invitation }, body: { name, password: testPassword } });
  if (answer.status !== 200) throw new Error(`an invitation was not accepted: ${await answer.text()}`);
  const { rows } = await database.query<Person>(
    `select u.id, u.name, u.email, u.units, u.time_zone as "timeZone" from users u where u.name = $1
     order by u.created_at desc limit 1`,
    [name],
  );
  return { person: rows[0], cookie: cookieOf(answer) };
}

export async function joinStudio(
  database: FreshDatabase,
  lead: StudioContext,
  role: StudioRole,
): Promise<SignedIn> {
  const n = nextNumber();
  const { id } = await inviteToStudio(lead, { email: `${role}.${n}@example.test`, role });
  return acceptAs(database, id, `Staff ${role} ${n}`);
}

export async function joinWorkspace(
  database: FreshDatabase,
  lead: WorkspaceContext,
  role: ClientRole,
): Promise<SignedIn> {
  const n = nextNumber();
  const { id } = await inviteToWorkspace(lead, { email: `${role}.${n}@example.test`, role });
  return acceptAs(database, id, `Client ${role} ${n}`);
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
  const lead = await makePerson(`Lead ${n}`);
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
