'use client';

import { useCallback, useEffect, useRef, useState } from 'react';
import { draftReturned, forgetDraft, keepDraft, readDraft, type NoteDraft } from './note-draft';

/** Written text reaches the device this long after the last key (at most a second may be lost). */
const settleMs = 250;

export interface NoteDraftHandle {
  /** Null until the device was read, or while nothing was written. */
  draft: NoteDraft | null;
  ready: boolean;
  /** Counts reads from the device, so that an editor knows when to take the text over. */
  generation: number;
  change: (change: Partial<Omit<NoteDraft, 'clientKey' | 'savedAt'>>) => void;
  /** Takes the draft away, here and on the device. */
  clear: () => Promise<void>;
}

function freshDraft(): NoteDraft {
  return {
    body: { type: 'doc', content: [{ type: 'paragraph' }] },
    clientKey: crypto.randomUUID(),
    mustSettle: false,
    pin: null,
    savedAt: Date.now(),
    refusal: null,
  };
}

/** The draft under `key` on this device, saved as it is written. */
export function useNoteDraft(key: string): NoteDraftHandle {
  const [state, setState] = useState<{ key: string; draft: NoteDraft | null; generation: number } | null>(
    null,
  );
  const pending = useRef<NoteDraft | null>(null);
  const timer = useRef<number | undefined>(undefined);

  const flush = useCallback(() => {
    window.clearTimeout(timer.current);
    const draft = pending.current;
    pending.current = null;
    if (draft) void keepDraft(key, draft);
  }, [key]);

  useEffect(() => {
    let current = true;
    const read = async () => {
      const draft = (await readDraft(key)) ?? null;
      if (current) setState((old) => ({ key, draft, generation: (old?.generation ?? 0) + 1 }));
    };
    void read();
    const onReturned = (event: Event) => {
      if ((event as CustomEvent<string>).detail === key) void read();
    };
    window.addEventListener(draftReturned, onReturned);
    window.addEventListener('pagehide', flush);
    return () => {
      current = false;
      window.removeEventListener(draftReturned, onReturned);
      window.removeEventListener('pagehide', flush);
      flush();
    };
  }, [key, flush]);

  const change = useCallback<NoteDraftHandle['change']>(
    (changes) => {
      setState((old) => {
        const draft = { ...(old?.draft ?? freshDraft()), refusal: null, ...changes, savedAt: Date.now() };
        pending.current = draft;
        return { key, draft, generation: old?.generation ?? 0 };
      });
      window.clearTimeout(timer.current);
      timer.current = window.setTimeout(flush, settleMs);
    },
    [key, flush],
  );

  const clear = useCallback(async () => {
    window.clearTimeout(timer.current);
    pending.current = null;
    setState((old) => ({ key, draft: null, generation: (old?.generation ?? 0) + 1 }));
    await forgetDraft(key);
  }, [key]);

  const mine = state?.key === key ? state : null;
  return {
    draft: mine?.draft ?? null,
    ready: mine !== null,
    generation: mine?.generation ?? 0,
    change,
    clear,
  };
}
