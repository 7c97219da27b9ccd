'use client';

import { useSyncExternalStore } from 'react';
import { Button } from 'react-aria-components';

export interface Notice {
  id: number;
  text: string;
  /** `trouble` interrupts a screen reader and stays until it is closed. */
  kind: 'done' | 'trouble';
  action?: { label: string; onPress: () => void };
}

let notices: readonly Notice[] = [];
let nextId = 1;
const listeners = new Set<() => void>();
const none: readonly Notice[] = [];
const lifeMs = 10_000;

function set(next: readonly Notice[]): void {
  notices = next;
  listeners.forEach((listener) => listener());
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

/** A notice may lie behind a dialog: it leaves only when there is none, so that it can be read after it. */
function leaveLater(id: number): void {
  window.setTimeout(() => {
    if (document.querySelector('[role="dialog"], [role="alertdialog"]')) leaveLater(id);
    else dismissNotice(id);
  }, lifeMs);
}

/** Tells the person what just happened; returns the notice's id. A `done` notice leaves after 10 s. */
export function notify(text: string, options: Partial<Pick<Notice, 'kind' | 'action'>> = {}): number {
  const notice: Notice = { id: nextId++, text, kind: options.kind ?? 'done', action: options.action };
  set([...notices.slice(-2), notice]);
  if (notice.kind === 'done') leaveLater(notice.id);
  return notice.id;
}

export function dismissNotice(id: number): void {
  if (notices.some((notice) => notice.id === id)) set(notices.filter((notice) => notice.id !== id));
}

/**
 * The live regions, mounted once by `Providers`; they exist before the first notice so that it is read out. They stand
 * to the side and below the layer of dialogs: nothing that is being filled in is ever covered.
 */
export function NoticeRegion() {
  const shown = useSyncExternalStore(
    subscribe,
    () => notices,
    () => none,
  );
  return (
    <div className="pointer-events-none fixed inset-x-0 bottom-0 z-30 flex flex-col gap-2 p-3 print:hidden sm:right-auto sm:w-96">
      <div role="status" aria-live="polite" className="flex w-full flex-col gap-2">
        {shown
          .filter((notice) => notice.kind === 'done')
          .map((notice) => (
            <NoticeCard key={notice.id} notice={notice} />
          ))}
      </div>
      <div role="alert" className="flex w-full flex-col gap-2">
        {shown
          .filter((notice) => notice.kind === 'trouble')
          .map((notice) => (
            <NoticeCard key={notice.id} notice={notice} />
          ))}
      </div>
    </div>
  );
}

function NoticeCard({ notice }: { notice: Notice }) {
  const trouble = notice.kind === 'trouble';
  return (
    <div
      className={`arrive pointer-events-auto flex w-full items-start gap-3 border border-l-4 bg-sheet px-4 py-2.5 text-base shadow-lift ${trouble ? 'border-madder' : 'border-verdigris'}`}
    >
      <span aria-hidden className={trouble ? 'text-madder' : 'text-verdigris'}>
        {trouble ? '▲' : '✓'}
      </span>
      <p className="min-w-0 grow">{notice.text}</p>
      {notice.action ? (
        <Button
          className="shrink-0 font-semibold text-verdigris underline underline-offset-3"
          onPress={() => {
            notice.action?.onPress();
            dismissNotice(notice.id);
          }}
        >
          {notice.action.label}
        </Button>
      ) : null}
      <Button
        aria-label="Close this message"
        className="-my-1 -mr-2 flex size-8 shrink-0 items-center justify-center text-slate hover:text-ink"
        onPress={() => dismissNotice(notice.id)}
      >
        <svg aria-hidden viewBox="0 0 12 12" className="w-2.5 stroke-current stroke-[1.5]">
          <path d="m1 1 10 10M11 1 1 11" />
        </svg>
      </Button>
    </div>
  );
}
