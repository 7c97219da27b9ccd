'use client';

import { useSyncExternalStore } from 'react';
import { createPortal } from 'react-dom';
import type { MentionMenu } from './mention-menu';

const closed = () => null;

/** Draws the open list of a `MentionMenu` where the menu floats it. */
export function MentionList({ menu, id }: { menu: MentionMenu; id: string }) {
  const open = useSyncExternalStore(menu.subscribe, menu.snapshot, closed);
  if (!open) return null;
  const { people, active } = open;
  return createPortal(
    <div className="min-w-56 border border-ink bg-sheet py-1 shadow-lift">
      <p role="status" className={people.length > 0 ? 'sr-only' : 'px-3 py-1.5 text-sm text-slate'}>
        {people.length === 0
          ? 'Nobody in this workspace has that name.'
          : `${people.length} ${people.length === 1 ? 'person' : 'people'}; arrows choose, Enter takes.`}
      </p>
      {people.length > 0 ? (
        <ul id={id} role="listbox" aria-label="People of this workspace">
          {people.map((person, index) => (
            <li
              key={person.id}
              id={`${id}-${index}`}
              role="option"
              aria-selected={index === active}
              className={`flex cursor-pointer items-baseline justify-between gap-4 px-3 py-1.5 text-base pointer-coarse:py-2.5 ${index === active ? 'bg-verdigris-wash' : ''}`}
              onPointerDown={(event) => event.preventDefault()}
              onClick={() => menu.take(index)}
            >
              {person.name}
              <span className="text-sm text-slate">{person.side}</span>
            </li>
          ))}
        </ul>
      ) : null}
    </div>,
    open.host,
  );
}
