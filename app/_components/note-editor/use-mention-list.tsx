'use client';

import type { SuggestionProps } from '@tiptap/suggestion';
import { useId, useMemo, useRef, useState } from 'react';
import { createPortal } from 'react-dom';
import { filterPeople, type Mentionable } from './filter-people';
import type { MentionSuggestion } from './note-extensions';

type Props = SuggestionProps<Mentionable, { id: string; label: string }>;
interface OpenList {
  props: Props;
  active: number;
}

/**
 * The list of people after an @. The caret stays in the text; arrows, Enter, Tab and Escape work the list, and
 * `aria-activedescendant` on the text names the one that Enter would take.
 */
export function useMentionList(people: readonly Mentionable[]) {
  const listId = useId();
  const known = useRef(people);
  known.current = people;
  const [open, setOpen] = useState<OpenList | null>(null);
  const latest = useRef<OpenList | null>(null);
  const host = useRef<HTMLElement | null>(null);

  const suggestion = useMemo<MentionSuggestion>(() => {
    const show = (next: OpenList | null) => {
      const text = (next ?? latest.current)?.props.editor.view.dom;
      latest.current = next;
      setOpen(next);
      if (!text) return;
      if (next && next.props.items.length > 0) {
        text.setAttribute('aria-controls', listId);
        text.setAttribute('aria-activedescendant', `${listId}-${next.active}`);
      } else {
        text.removeAttribute('aria-controls');
        text.removeAttribute('aria-activedescendant');
      }
    };
    let unmount: (() => void) | undefined;
    return {
      items: ({ query }) => filterPeople(known.current, query),
      command: ({ editor, range, props }) => {
        editor
          .chain()
          .focus()
          .insertContentAt(range, [
            { type: 'mention', attrs: { id: props.id, label: props.label } },
            { type: 'text', text: ' ' },
          ])
          .run();
      },
      render: () => ({
        onStart: (props) => {
          host.current = document.createElement('div');
          host.current.className = 'z-50';
          unmount = props.mount(host.current);
          show({ props, active: 0 });
        },
        onUpdate: (props) => {
          const last = Math.max(0, props.items.length - 1);
          show({ props, active: Math.min(latest.current?.active ?? 0, last) });
        },
        onKeyDown: ({ event }) => {
          const list = latest.current;
          const count = list?.props.items.length ?? 0;
          if (!list || count === 0) return false;
          const move = (to: number) => show({ ...list, active: (to + count) % count });
          if (event.key === 'ArrowDown') move(list.active + 1);
          else if (event.key === 'ArrowUp') move(list.active - 1);
          else if (event.key === 'Enter' || event.key === 'Tab') take(list, list.active);
          else return false;
          return true;
        },
        onExit: () => {
          unmount?.();
          show(null);
          host.current = null;
        },
      }),
    };
  }, [listId]);

  const list =
    open && host.current
      ? createPortal(
          <MentionList
            id={listId}
            people={open.props.items}
            active={open.active}
            take={(i) => take(open, i)}
          />,
          host.current,
        )
      : null;
  return { suggestion, list };
}

function take({ props }: OpenList, index: number): void {
  const person = props.items[index];
  if (person) props.command({ id: person.id, label: person.name });
}

function MentionList(props: {
  id: string;
  people: readonly Mentionable[];
  active: number;
  take: (index: number) => void;
}) {
  const { id, people, active, take: choose } = props;
  return (
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
              onClick={() => choose(index)}
            >
              {person.name}
              <span className="text-sm text-slate">{person.side}</span>
            </li>
          ))}
        </ul>
      ) : null}
    </div>
  );
}
