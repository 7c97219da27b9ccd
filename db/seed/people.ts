import { randomInt } from 'node:crypto';
import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { claimAddress } from '@/lib/auth/claim-address';
import { personContext, type Person } from '@/lib/auth/context';
import { enterStudio, enterWorkspace } from '@/lib/auth/enter';
import { weakness } from '@/lib/auth/weak-password';
import { openStudio } from '@/lib/studio/open-studio';
import { insertStaff, insertStudioEntry } from '@/lib/studio/studio-data';
import { createWorkspace } from '@/lib/workspaces/create-workspace';
import { insertMember } from '@/lib/workspaces/people-data';
import type { ClientRole, StudioRole } from '@/lib/workspaces/roles';
import { uuidv7 } from 'uuidv7';

/** The demo studio's people and clients: all invented. */

export type DemoSignIn = { name: string; email: string; password: string; role: string };

const words =
  'amber birch cedar delta ember flint grove heath ivory jetty kelp larch maple north oat plum'.split(' ');

/** Four words and a number: long enough for the rules, easy to type from a terminal. */
const newPassword = () =>
  [...Array.from({ length: 4 }, () => words[randomInt(words.length)]), String(randomInt(10, 100))].join('-');

const cast = {
  okafor: { name: 'Lewin Okafor', email: 'lewin@larkfield.example', at: 'lead at Larkfield Forming' },
  ferro: { name: 'Mara Ferro', email: 'mara@larkfield.example', at: 'designer at Larkfield Forming' },
  halvorsen: { name: 'Jun Halvorsen', email: 'jun@larkfield.example', at: 'producer at Larkfield Forming' },
  brandt: { name: 'Anselm Brandt', email: 'anselm@quillon.example', at: 'approver at Quillon Patisserie' },
  duarte: { name: 'Pia Duarte', email: 'pia@quillon.example', at: 'reviewer at Quillon Patisserie' },
  valcourt: { name: 'Ines Valcourt', email: 'ines@tamsinridge.example', at: 'approver at Tamsin Ridge' },
} as const;

export type CastName = keyof typeof cast;
export type Cast = Record<CastName, Person & { password: string }>;

export async function makePeople(): Promise<{ people: Cast; signIns: DemoSignIn[] }> {
  const people = {} as Cast;
  const signIns: DemoSignIn[] = [];
  for (const [key, { name, email, at }] of Object.entries(cast) as [CastName, (typeof cast)[CastName]][]) {
    let password = newPassword();
    // Sixteen words are few: the same one may come three times.
    while (await weakness(password, { name, email })) password = newPassword();
    people[key] = { ...(await claimAddress({ name, email, password })), password };
    signIns.push({ name, email, password, role: at });
  }
  return { people, signIns };
}

/** Opens the studio with its staff, and the clients' workspaces with theirs. */
export async function openHouse(people: Cast): Promise<{ quillon: string; tamsin: string }> {
  const { id: studioId } = await openStudio(personContext(people.okafor), { name: 'Larkfield Forming' });
  await joinStaff(people, studioId, 'ferro', 'designer');
  await joinStaff(people, studioId, 'halvorsen', 'producer');
  const lead = await enterStudio(people.okafor, studioId);
  const quillon = await createWorkspace(lead, { name: 'Quillon Patisserie', code: 'QP' });
  const tamsin = await createWorkspace(lead, { name: 'Tamsin Ridge Botanicals', code: 'TR' });
  await joinClient(people, quillon.id, 'brandt', 'approver');
  await joinClient(people, quillon.id, 'duarte', 'reviewer');
  await joinClient(people, tamsin.id, 'valcourt', 'approver');
  return { quillon: quillon.id, tamsin: tamsin.id };
}

async function joinStaff(people: Cast, studioId: string, key: CastName, role: StudioRole): Promise<void> {
  const lead = await enterStudio(people.okafor, studioId);
  const person = people[key];
  await withTenant(lead, async (tx) => {
    await insertStaff(tx, { id: uuidv7(), studioId, userId: person.id, role });
    await insertStudioEntry(tx, { ...lead, person }, 'person.joined', {
      personId: person.id,
      name: person.name,
      role,
    });
  });
}

async function joinClient(people: Cast, workspaceId: string, key: CastName, role: ClientRole): Promise<void> {
  const lead = await enterWorkspace(people.okafor, workspaceId);
  const person = people[key];
  await withTenant(lead, async (tx) => {
    await insertMember(tx, { id: uuidv7(), workspaceId, userId: person.id, role });
    await appendEntry(
      tx,
      { ...lead, person },
      {
        action: 'person.joined',
        subjectKind: 'person',
        subjectId: person.id,
        detail: { name: person.name, role },
      },
    );
  });
}
