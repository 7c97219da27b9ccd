'use client';

import { useEffect, useRef, useSyncExternalStore } from 'react';

const storageKey = 'firstpull-room-keys';
const listeners = new Set<() => void>();

const subscribe = (listener: () => void) => {
  listeners.add(listener);
  return () => {
    listeners.delete(listener);
  };
};

/** Whether the room's single keys work; a person may switch them off on this device (WCAG 2.2, 2.1.4). */
export function useKeysOn(): [boolean, (on: boolean) => void] {
  const on = useSyncExternalStore(
    subscribe,
    () => window.localStorage.getItem(storageKey) !== 'off',
    () => true,
  );
  return [
    on,
    (next) => {
      window.localStorage.setItem(storageKey, next ? 'on' : 'off');
      listeners.forEach((listener) => listener());
    },
  ];
}

export interface RoomKeys {
  next: () => void;
  previous: () => void;
  filter: () => void;
  comment: () => void;
}

/** True where a letter is text, a choice, or belongs to something in front of the page. */
export function isTakenByTarget(target: EventTarget | null): boolean {
  if (!(target instanceof HTMLElement)) return false;
  if (
    target.isContentEditable ||
    target.closest('input, textarea, select, [role="listbox"], [role="menu"]')
  ) {
    return true;
  }
  return target.closest('[role="dialog"], [role="alertdialog"]') !== null;
}

/** `n` and `p` walk the docket, `/` goes to its filter, `c` begins a note. */
export function useRoomKeys(on: boolean, keys: RoomKeys): void {
  const latest = useRef(keys);
  useEffect(() => {
    latest.current = keys;
  });
  useEffect(() => {
    if (!on) return;
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey) return;
      if (isTakenByTarget(event.target) || document.querySelector('[aria-modal="true"]')) return;
      const act = {
        n: latest.current.next,
        p: latest.current.previous,
        '/': latest.current.filter,
        c: latest.current.comment,
      }[event.key];
      if (!act) return;
      event.preventDefault();
      act();
    };
    document.addEventListener('keydown', onKeyDown);
    return () => document.removeEventListener('keydown', onKeyDown);
  }, [on]);
}
