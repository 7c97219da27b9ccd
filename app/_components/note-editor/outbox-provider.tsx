'use client';

import { useQueryClient } from '@tanstack/react-query';
import { createContext, use, useEffect, useState, useSyncExternalStore, type ReactNode } from 'react';
import { useLive } from '../live/live-provider';
import { queryKeys } from '../live/query-keys';
import { notify } from '../notices';
import { deviceStore } from './key-value-store';
import { returnDraft } from './note-draft';
import { NoteOutbox, type OutgoingEntry, type OutgoingNote } from './note-outbox';
import { sendNote } from './send-note';

/** How often notes that wait are tried again while the page stays open. */
const againMs = 15_000;
const none: readonly OutgoingEntry[] = [];

export const OutboxContext = createContext<NoteOutbox | null>(null);

/** Holds the notes that are on their way, and sends them when the connection is back. */
export function OutboxProvider({ personId, children }: { personId: string; children: ReactNode }) {
  const queries = useQueryClient();
  const { status } = useLive();
  const [outbox] = useState(
    () =>
      new NoteOutbox(
        {
          store: deviceStore('firstpull-outbox'),
          send: sendNote,
          onSent: (note) =>
            queries.invalidateQueries({ queryKey: queryKeys.docket(note.workspaceId, note.revisionId) }),
          onRefused: async (note, error) => {
            await returnDraft(note.draftKey, draftOf(note, error.detail));
            notify(`The note was not posted. ${error.detail} Your text is kept where you wrote it.`, {
              kind: 'trouble',
            });
          },
          onTakenBack: async (note) => {
            await returnDraft(note.draftKey, draftOf(note, 'The server could not take this note.'));
            notify('The note was not posted. Your text is back where you wrote it.');
          },
        },
        personId,
      ),
  );

  useEffect(() => {
    void outbox.open();
    const flush = () => void outbox.flush();
    window.addEventListener('online', flush);
    const timer = window.setInterval(() => {
      if (outbox.snapshot().length > 0) flush();
    }, againMs);
    return () => {
      window.removeEventListener('online', flush);
      window.clearInterval(timer);
    };
  }, [outbox]);
  useEffect(() => {
    if (status === 'live') void outbox.flush();
  }, [status, outbox]);

  return <OutboxContext value={outbox}>{children}</OutboxContext>;
}

function draftOf(note: OutgoingNote, refusal: string) {
  const { body, clientKey, mustSettle, pin } = note;
  return { body, clientKey, mustSettle, pin, refusal, savedAt: Date.now() };
}

export function useOutbox(): NoteOutbox {
  const outbox = use(OutboxContext);
  if (!outbox) throw new Error('useOutbox needs an OutboxProvider above it.');
  return outbox;
}

/** Notes of this revision that the server has not answered for yet. */
export function useOutgoing(revisionId: string): readonly OutgoingEntry[] {
  const outbox = useOutbox();
  const entries = useSyncExternalStore(outbox.subscribe, outbox.snapshot, () => none);
  return entries.filter((entry) => entry.revisionId === revisionId);
}
