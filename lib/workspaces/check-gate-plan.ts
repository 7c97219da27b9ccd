import type { GateInput } from './gate-plan-schemas';
import type { Role } from './role-names';

// Free of zod: the editor tells the same before anything is sent.

/** Roles whose permission includes signing (`gate.sign` in roles.ts), the only ones that a gate may ask. */
export const signingRoles = ['designer', 'lead', 'approver'] as const;
export type SigningRole = (typeof signingRoles)[number];

export const gateConditions = ['checks-pass', 'docket-settled'] as const;
export const mostGates = 12;
export const mostDueDays = 90;

/** One thing that is wrong with a plan: at which gate (null: the plan as a whole), in which field. */
export type PlanProblem = { at: number | null; field: string; detail: string };

/** What is wrong with a plan by itself, whoever belongs to the workspace. */
export function shapeProblems(gates: readonly GateInput[]): PlanProblem[] {
  const problems: PlanProblem[] = [];
  const names = new Map<string, number>();
  const keys = new Set<string>();
  gates.forEach((gate, at) => {
    const same = names.get(gate.name.toLowerCase());
    if (same !== undefined)
      problems.push({
        at,
        field: 'name',
        detail: `Gate ${same + 1} has this name already. Give each its own.`,
      });
    else names.set(gate.name.toLowerCase(), at);
    if (gate.key && keys.has(gate.key))
      problems.push({ at, field: 'key', detail: 'Another gate has this key.' });
    if (gate.key) keys.add(gate.key);
    if (gate.kind !== 'people') return;
    if (!gate.roles.length && !gate.people.length)
      problems.push({ at, field: 'roles', detail: 'Say who signs: choose roles or name people.' });
    if (gate.roles.length && gate.people.length)
      problems.push({ at, field: 'people', detail: 'Choose roles or name people, not both.' });
  });
  if (!gates.some((gate) => gate.kind === 'people'))
    problems.push({
      at: null,
      field: 'gates',
      detail: 'At least one gate has to be signed by people: nothing is agreed by itself.',
    });
  else if (gates.at(-1)?.kind === 'automatic')
    problems.push({
      at: gates.length - 1,
      field: 'kind',
      detail: 'The last gate is signed by people: their last signature locks the revision. Move this one up.',
    });
  return problems;
}

/** A member, as far as a plan asks about them. */
export type PlanPerson = { id: string; name: string; role: Role };
/** How many clients are invited and have not come yet, by role. */
export type Invited = Partial<Record<Role, number>>;
type PeopleGate = Extract<GateInput, { kind: 'people' }>;

/** Who may post, and so be the author whom four eyes keep away. */
const posts = (person: PlanPerson) => person.role === 'designer' || person.role === 'lead';
const signs = (role: Role) => (signingRoles as readonly string[]).includes(role);

/** Whom a gate asks, four eyes aside. */
export const askedBy = (gate: Pick<PeopleGate, 'roles' | 'people'>, people: readonly PlanPerson[]) =>
  people.filter((person) =>
    gate.people.length
      ? gate.people.includes(person.id) && signs(person.role)
      : (gate.roles as readonly string[]).includes(person.role),
  );

/** Whether only clients may sign there. */
export function isClients(gate: GateInput, people: readonly PlanPerson[]): boolean {
  if (gate.kind !== 'people') return false;
  if (!gate.people.length) return gate.roles.length > 0 && gate.roles.every((role) => role === 'approver');
  const asked = askedBy(gate, people);
  return asked.length > 0 && asked.every((person) => person.role === 'approver');
}

/**
 * How many may sign a gate, under four eyes for the author that leaves most and the one that leaves fewest. People
 * who are invited count: they may come before a revision does.
 */
export function signersOf(
  gate: PeopleGate,
  people: readonly PlanPerson[],
  invited: Invited,
): { most: number; fewest: number } {
  const asked = askedBy(gate, people);
  const coming = gate.people.length ? 0 : gate.roles.reduce((sum, role) => sum + (invited[role] ?? 0), 0);
  const count = asked.length + coming;
  if (!gate.fourEyes) return { most: count, fewest: count };
  const authors = people.filter(posts);
  const asksAuthor = (author: PlanPerson) => asked.some(({ id }) => id === author.id);
  return {
    most: count - (authors.length > 0 && authors.every(asksAuthor) ? 1 : 0),
    fewest: count - (authors.some(asksAuthor) ? 1 : 0),
  };
}

const counted = (n: number) => (n === 0 ? 'nobody' : n === 1 ? 'one person' : `${n} people`);

/**
 * What is wrong with a plan in this workspace: people who do not belong or do not sign, gates that could never pass,
 * nobody but the author asked, and a plan that ends without the client although nobody said so.
 */
export function peopleProblems(
  { gates, endsWithoutClient }: { gates: readonly GateInput[]; endsWithoutClient: boolean },
  people: readonly PlanPerson[],
  invited: Invited,
): PlanProblem[] {
  const problems: PlanProblem[] = [];
  gates.forEach((gate, at) => {
    if (gate.kind !== 'people') return;
    for (const id of gate.people) {
      const person = people.find((one) => one.id === id);
      if (!person)
        problems.push({
          at,
          field: 'people',
          detail: 'One of the named people does not belong to this workspace. Take them off the gate.',
        });
      else if (!signs(person.role))
        problems.push({
          at,
          field: 'people',
          detail: `${person.name} is ${person.role} here, a role that does not sign. Name somebody else.`,
        });
    }
    if (!gate.roles.length && !gate.people.length) return;
    const { most } = signersOf(gate, people, invited);
    const needed = gate.quorum === 'all' ? 1 : gate.quorum;
    if (most < needed)
      problems.push({
        at,
        field: 'quorum',
        detail: `${gate.name} asks for ${needed === 1 ? 'a signature' : `${needed} signatures`}, but ${counted(most)} could give one here${gate.fourEyes && askedBy(gate, people).some(posts) ? ', as an author never signs' : ''}. Ask for fewer, ask others, or invite people first.`,
      });
  });
  const signed = gates.flatMap((gate, at) => (gate.kind === 'people' ? [{ gate, at }] : []));
  const last = signed.at(-1);
  if (!last) return problems;
  if (!signed.some(({ gate }) => gate.fourEyes || isClients(gate, people)))
    problems.push({
      at: last.at,
      field: 'fourEyes',
      detail:
        'Under this plan an author could agree alone. Keep four eyes at one gate at least, or ask the client.',
    });
  if (!endsWithoutClient && !isClients(last.gate, people))
    problems.push({
      at: last.at,
      field: 'roles',
      detail: `The last name is the client’s: let approvers sign ${last.gate.name}, or say that this plan ends without the client.`,
    });
  return problems;
}

/** What a lead should know of a plan that may stand: where it could wait in vain, and what it does not wait for. */
export function planHints(
  gates: readonly GateInput[],
  people: readonly PlanPerson[],
  invited: Invited,
): PlanProblem[] {
  const hints: PlanProblem[] = [];
  gates.forEach((gate, at) => {
    if (gate.kind !== 'people' || (!gate.roles.length && !gate.people.length)) return;
    const { most, fewest } = signersOf(gate, people, invited);
    const needed = gate.quorum === 'all' ? 1 : gate.quorum;
    if (most >= needed && fewest < needed)
      hints.push({
        at,
        field: 'quorum',
        detail: `When one of those whom it asks posts the revision, too few are left to sign ${gate.name}.`,
      });
  });
  if (!gates.some((gate) => gate.kind === 'automatic' && gate.conditions.includes('checks-pass')))
    hints.push({
      at: null,
      field: 'gates',
      detail: 'No gate waits for the checks: a revision with failing findings could be signed.',
    });
  return hints;
}
