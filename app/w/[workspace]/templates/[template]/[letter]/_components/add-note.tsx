'use client';

import { useEffect, useRef } from 'react';
import { Button } from '@/app/_components/button';
import type { NotePin } from '@/app/_components/note-editor/note-draft';
import { NoteComposer } from '@/app/_components/note-editor/note-composer';
import { useOutgoing } from '@/app/_components/note-editor/outbox-provider';
import { usePreferences } from '@/app/_components/preferences-context';
import { OutgoingNoteEntry } from './note-entry';
import { placeWords } from './place-words';
import { useRoom } from './room-context';

/** Begins a thread: free or pinned to a place, to be settled before the next gate or not. */
export function AddNote({ isOpen, onOpen }: { isOpen: boolean; onOpen: (isOpen: boolean) => void }) {
  const { workspace, revision, reader, people } = useRoom();
  const waiting = useOutgoing(revision.id).filter((entry) => !entry.threadId && !entry.findingId);
  const agreed = revision.lockedAt !== null;
  if (!revision.can.note) {
    return waiting.map((entry) => <OutgoingNoteEntry key={entry.clientKey} entry={entry} />);
  }
  if (!isOpen && waiting.length === 0) return null;
  return (
    <div className="flex flex-col gap-3 print:hidden">
      {isOpen ? (
        <section aria-label="New note" className="border border-ink bg-sheet p-3">
          {agreed ? (
            <p className="pb-2 text-sm text-slate">
              This revision is agreed. What you write now stands under “After approval” and changes nothing of
              it.
            </p>
          ) : null}
          <NoteComposer
            personId={reader.id}
            workspaceId={workspace.id}
            revisionId={revision.id}
            people={people}
            label="New note"
            placeholder="What should be looked at?"
            sendLabel="Post the note"
            autoFocus
            offersMustSettle={!agreed}
            onSent={() => onOpen(false)}
            onCancel={() => onOpen(false)}
          >
            {({ draft, change }) => (
              <PinPicker pin={draft?.pin ?? null} onChange={(pin) => change({ pin })} />
            )}
          </NoteComposer>
        </section>
      ) : null}
      {waiting.map((entry) => (
        <OutgoingNoteEntry key={entry.clientKey} entry={entry} />
      ))}
    </div>
  );
}

function PinPicker({ pin, onChange }: { pin: NotePin | null; onChange: (pin: NotePin | null) => void }) {
  const { units } = usePreferences();
  const { askForPin, placing } = useRoom();
  const button = useRef<HTMLButtonElement>(null);
  const asked = useRef(false);
  useEffect(() => {
    if (placing || !asked.current) return;
    asked.current = false;
    button.current?.focus();
  }, [placing]);
  if (placing) {
    return (
      <p role="status" className="border border-verdigris bg-verdigris-wash px-3 py-2 text-sm">
        Press on the model where the note belongs, or bring the place to the cross-hair and press Enter.
        Escape leaves it free.
      </p>
    );
  }
  return (
    <div className="flex flex-wrap items-center gap-x-3 gap-y-1 text-sm">
      {pin ? (
        <span>
          Pinned at <span className="font-mono text-xs">{placeWords(pin.at, units)}</span>
        </span>
      ) : (
        <span className="text-slate">Not pinned to a place</span>
      )}
      {askForPin ? (
        <Button
          ref={button}
          size="small"
          onPress={() => {
            asked.current = true;
            askForPin((placed) => {
              if (placed) onChange(placed);
            });
          }}
        >
          {pin ? 'Move the pin' : 'Pin it to the model'}
        </Button>
      ) : null}
      {pin ? (
        <Button size="small" variant="plain" onPress={() => onChange(null)}>
          Unpin
        </Button>
      ) : null}
    </div>
  );
}
