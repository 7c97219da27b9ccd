'use client';

import { useCallback, useEffect, useRef, useState } from 'react';
import { api, ApiError, explainError } from '@/app/_components/api-client';

export type DraftFields = { uploadId: string | null; recipe: Record<string, unknown>; note: string };
type Saved = { version: number };

export type SaveState =
  | { kind: 'saved'; at: number | null }
  | { kind: 'saving' }
  | { kind: 'trouble'; detail: string; stale: boolean };

const restMs = 800;

/**
 * Keeps the draft on the server in step with the form: saves when typing rests, one save at a time, each
 * naming the version it read. A draft that somebody else changed is never overwritten.
 */
export function useDraft(path: string, initial: DraftFields & { version: number }) {
  const [state, setState] = useState<SaveState>({ kind: 'saved', at: null });
  const version = useRef(initial.version);
  const wanted = useRef<DraftFields>(initial);
  const dirty = useRef(false);
  const running = useRef<Promise<void> | null>(null);
  const timer = useRef<ReturnType<typeof setTimeout> | null>(null);

  const save = useCallback(async (): Promise<void> => {
    if (timer.current) clearTimeout(timer.current);
    while (running.current) await running.current;
    if (!dirty.current) return;
    dirty.current = false;
    const work = (async () => {
      setState({ kind: 'saving' });
      try {
        const saved = await api<Saved>(path, {
          method: 'PUT',
          body: { ...wanted.current, version: version.current },
        });
        version.current = saved.version;
        setState({ kind: 'saved', at: Date.now() });
      } catch (error) {
        dirty.current = true;
        const stale = error instanceof ApiError && error.code === 'precondition_failed';
        setState({ kind: 'trouble', detail: explainError(error).detail, stale });
        throw error;
      } finally {
        running.current = null;
      }
    })();
    running.current = work.catch(() => undefined);
    return work;
  }, [path]);

  const change = useCallback(
    (part: Partial<DraftFields>) => {
      wanted.current = { ...wanted.current, ...part };
      dirty.current = true;
      if (timer.current) clearTimeout(timer.current);
      timer.current = setTimeout(() => void save().catch(() => undefined), restMs);
    },
    [save],
  );

  useEffect(() => {
    const warn = (event: BeforeUnloadEvent) => {
      if (dirty.current) event.preventDefault();
    };
    const again = () => void save().catch(() => undefined);
    window.addEventListener('beforeunload', warn);
    window.addEventListener('online', again);
    return () => {
      window.removeEventListener('beforeunload', warn);
      window.removeEventListener('online', again);
      if (timer.current) clearTimeout(timer.current);
    };
  }, [save]);

  return { state, change, save, version };
}
