import { initialsOf } from './initials';
import { StatusWord, type State } from './status-word';

const words: Record<'live' | 'polling' | 'offline', { state: State; word: string }> = {
  live: { state: 'live', word: 'Live' },
  polling: { state: 'polling', word: 'Not live: asks every few seconds' },
  offline: { state: 'offline', word: 'No connection: showing what was here last' },
};

/** Whether this page hears of changes at once; for the `live` slot of `AppShell`. */
export function LiveState({ state }: { state: 'live' | 'polling' | 'offline' }) {
  return (
    <span role="status" className="text-sm">
      <StatusWord state={words[state].state} word={words[state].word} />
    </span>
  );
}

/** Who has this page open now. */
export function Presence({ people }: { people: readonly { id: string; name: string }[] }) {
  if (people.length === 0) return null;
  return (
    <span className="flex items-center gap-1.5">
      <span className="text-sm text-slate max-sm:sr-only">Here now</span>
      <ul className="flex gap-1">
        {people.slice(0, 5).map((person) => (
          <li
            key={person.id}
            title={person.name}
            className="flex size-7 items-center justify-center border border-edge bg-sheet font-mono text-[0.625rem] font-medium"
          >
            <span aria-hidden>{initialsOf(person.name)}</span>
            <span className="sr-only">{person.name}</span>
          </li>
        ))}
        {people.length > 5 ? (
          <li className="self-center pl-1 text-sm text-slate">and {people.length - 5} more</li>
        ) : null}
      </ul>
    </span>
  );
}
