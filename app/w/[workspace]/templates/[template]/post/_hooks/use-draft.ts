'use client';

import { useCallback, useEffect, useRef, useState } from 'react';
import { api, ApiError, explainError } from '@/app/_components/api-client';

export type DraftFields = { uploadId: string | null; recipe: Record<string, unknown>; note: string };
type Editor = { id: string; name: string };
type Saved = { version: number; changedBy?: Editor };

/** What this form can no longer be saved over: a newer state of the draft, or nothing, where it was posted or discarded. */
export type Clash = { kind: 'changed'; by: Editor | null } | { kind: 'gone' };

export type SaveState =
  | { kind: 'saved'; at: number | null }
  | { kind: 'saving' }
  | { kind: 'trouble'; detail: string; clash: Clash | null };

const restMs = 800;

/**
 * Keeps the draft on the server in step with the form: saves when typing rests and when the page is left, one
 * save at a time, each naming the version it read. Only `keepMine` overwrites what somebody else changed.
 */
export function useDraft(path: string, initial: DraftFields & { version: number }) {
  const [state, setState] = useState<SaveState>({ kind: 'saved', at: null });
  const version = useRef(initial.version);
  const wanted = useRef<DraftFields>(initial);
  const dirty = useRef(false);
  const running = useRef<Promise<void> | null>(null);
  const timer = useRef<ReturnType<typeof setTimeout> | null>(null);

  /** Shows a clash, if that is what an answer of the server means; says whether it is one. */
  const tell = useCallback(
    async (error: unknown): Promise<boolean> => {
      if (!(error instanceof ApiError)) return false;
      const { detail } = explainError(error);
      if (error.reason === 'no-draft') setState({ kind: 'trouble', detail, clash: { kind: 'gone' } });
      else if (error.code !== 'precondition_failed') return false;
      else {
        const by = await api<Saved>(path).then(
          ({ changedBy }) => changedBy ?? null,
          () => null,
        );
        setState({ kind: 'trouble', detail, clash: { kind: 'changed', by } });
      }
      return true;
    },
    [path],
  );

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
        if (!(await tell(error)))
          setState({ kind: 'trouble', detail: explainError(error).detail, clash: null });
        throw error;
      } finally {
        running.current = null;
      }
    })();
    running.current = work.catch(() => undefined);
    return work;
  }, [path, tell]);

  const change = useCallback(
    (part: Partial<DraftFields>) => {
      wanted.current = { ...wanted.current, ...part };
      dirty.current = true;
      if (timer.current) clearTimeout(timer.current);
      timer.current = setTimeout(() => void save().catch(() => undefined), restMs);
    },
    [save],
  );

  /** Takes the version that the server has now, a new draft where there is none, and saves this form over it. */
  const keepMine = useCallback(async (): Promise<void> => {
    try {
      version.current = (await api<Saved>(path)).version;
    } catch (error) {
      const { detail } = explainError(error);
      setState((old) =>
        old.kind === 'trouble' ? { ...old, detail } : { kind: 'trouble', detail, clash: null },
      );
      throw error;
    }
    dirty.current = true;
    await save();
  }, [path, save]);

  /** Gives up what was not saved: nothing warns of it or saves it later. */
  const forget = useCallback(() => {
    if (timer.current) clearTimeout(timer.current);
    dirty.current = false;
  }, []);

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
      void save().catch(() => undefined);
    };
  }, [save]);

  return { state, change, save, keepMine, forget, tell, version };
}
