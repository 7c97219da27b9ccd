'use client';

import { LiveState, Presence } from '../live-state';
import { useLive } from './live-provider';

/** Who else has this page open, and whether the page is live (else the banner says so); for the `live` slot of `AppShell`. */
export function LiveCorner() {
  const { status, people, personId } = useLive();
  const others = people.filter((person) => person.id !== personId);
  return (
    <>
      <Presence people={others} />
      {status === 'live' ? (
        <span className="max-sm:sr-only">
          <LiveState state="live" />
        </span>
      ) : null}
    </>
  );
}
