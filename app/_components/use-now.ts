'use client';

import { useSyncExternalStore } from 'react';
import { usePreferences } from './preferences-context';

const tick = 30_000;
let now = 0;
let timer: ReturnType<typeof setInterval> | undefined;
const listeners = new Set<() => void>();

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  if (timer === undefined) {
    now = Date.now();
    timer = setInterval(() => {
      now = Date.now();
      listeners.forEach((each) => each());
    }, tick);
  }
  return () => {
    listeners.delete(listener);
    if (listeners.size === 0) {
      clearInterval(timer);
      timer = undefined;
    }
  };
}

function read(): number {
  // Without a timer the last reading serves until it is old, so that one render sees one time.
  if (timer === undefined && Date.now() - now > tick) now = Date.now();
  return now;
}

/** The time in ms, renewed twice a minute by one timer; while hydrating, the time the server rendered at. */
export function useNow(): number {
  const { renderedAt } = usePreferences();
  return useSyncExternalStore(subscribe, read, () => renderedAt);
}
