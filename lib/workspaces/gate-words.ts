import type { GateRuleView } from './gate-plan-schemas';

// Browser-safe: the page, the activity list and the history say the same of a gate.

const joined = (words: readonly string[], last: 'or' | 'and') =>
  words.length < 2 ? (words[0] ?? '') : `${words.slice(0, -1).join(', ')} ${last} ${words.at(-1)}`;
const someoneGone = 'somebody who has left';
const numbers = ['', 'One', 'Two', 'Three', 'Four', 'Five', 'Six', 'Seven', 'Eight', 'Nine'];
const numberWord = (n: number) => numbers[n] ?? String(n);

/** Who signs a gate, as one sentence without what follows from four eyes. */
export function whoSigns({ roles, people, quorum }: GateRuleView): string {
  if (people.length) {
    const names = people.map(({ name }) => name ?? someoneGone);
    if (people.length === 1) return `${names[0]} signs.`;
    if (quorum === 'all') return `${joined(names, 'and')} sign, each of them.`;
    return quorum === 1
      ? `One of ${joined(names, 'and')} signs.`
      : `${numberWord(quorum)} of ${joined(names, 'and')} sign.`;
  }
  if (quorum === 'all') return `Every ${roles.join(' and every ')} signs.`;
  return quorum === 1
    ? `One ${joined(roles, 'or')} signs.`
    : `${numberWord(quorum)} people who are ${joined(roles, 'or')} sign.`;
}

const conditionWords = {
  'checks-pass':
    'the check run has finished and no failing finding is open; a lead may waive one with a reason',
  'docket-settled': 'nothing on the docket is left that must be settled',
};

/** When an automatic gate passes, as one sentence. */
export const whenPasses = ({ conditions }: GateRuleView): string =>
  `Passes by itself when ${conditions.map((condition) => conditionWords[condition]).join(', and when ')}.`;

export const daysWord = (days: number) => (days === 1 ? '1 day' : `${days} days`);

const same = (a: unknown, b: unknown) => JSON.stringify(a) === JSON.stringify(b);

/** What a version changed against the one before it: a few words for each thing; empty when nothing differs. */
export function planChanges(before: readonly GateRuleView[], after: readonly GateRuleView[]): string[] {
  const changes: string[] = [];
  const old = new Map(before.map((gate) => [gate.key, gate]));
  for (const gate of after) {
    const was = old.get(gate.key);
    if (!was) changes.push(`added ${gate.name}`);
    else changes.push(...gateChanges(was, gate));
  }
  const kept = new Set(after.map(({ key }) => key));
  for (const gate of before) if (!kept.has(gate.key)) changes.push(`took out ${gate.name}`);
  const order = (gates: readonly GateRuleView[], others: ReadonlySet<string>) =>
    gates.map(({ key }) => key).filter((key) => others.has(key));
  if (!same(order(before, kept), order(after, new Set(old.keys())))) changes.push('changed the order');
  return changes;
}

function gateChanges(was: GateRuleView, now: GateRuleView): string[] {
  const changes: string[] = [];
  if (was.name !== now.name) changes.push(`renamed ${was.name} to ${now.name}`);
  if (was.kind !== now.kind)
    changes.push(`made ${now.name} ${now.kind === 'people' ? 'a gate that people sign' : 'automatic'}`);
  else if (now.kind === 'automatic') {
    if (!same(was.conditions, now.conditions)) changes.push(`${now.name}: ${whenPasses(now)}`);
    return changes;
  }
  if (now.kind !== 'people') return changes;
  const people = (gate: GateRuleView) => gate.people.map(({ id }) => id);
  if (!same([was.roles, people(was), was.quorum], [now.roles, people(now), now.quorum]))
    changes.push(`${now.name}: ${whoSigns(now)}`);
  if (was.fourEyes !== now.fourEyes)
    changes.push(`${now.name}: the author ${now.fourEyes ? 'never signs' : 'may sign'}`);
  if (was.dueDays !== now.dueDays)
    changes.push(
      now.dueDays === null
        ? `${now.name}: no due day`
        : `${now.name}: due ${daysWord(now.dueDays)} after it opens`,
    );
  if (was.meaning !== now.meaning && was.kind === now.kind) changes.push(`${now.name}: other words to sign`);
  return changes;
}
