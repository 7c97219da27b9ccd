'use client';

import { Button } from '@/app/_components/button';
import { NoteBody } from '@/app/_components/note-editor/note-body';
import type { OutgoingEntry } from '@/app/_components/note-editor/note-outbox';
import { useOutbox } from '@/app/_components/note-editor/outbox-provider';
import { StateShape } from '@/app/_components/state-shape';
import { Time } from '@/app/_components/time';
import { Link } from '@/app/_components/link';
import { useNow } from '@/app/_components/use-now';
import type { NoteView } from '@/lib/review/schemas';

/** One note of a thread, as it was said. */
export function NoteEntry({ note }: { note: NoteView }) {
  return (
    <div className="break-inside-avoid">
      <p className="text-sm">
        <span className="font-semibold">{note.authorName}</span>{' '}
        <span className="text-slate">
          <SaidWhen at={note.createdAt} />
          <span className="hidden print:inline">
            <Time at={note.createdAt} show="moment" />
          </span>
        </span>
      </p>
      <NoteBody body={note.body} />
    </div>
  );
}

/** The page's clock goes in half minutes: a note that was said since its last tick is not in the future. */
function SaidWhen({ at }: { at: string }) {
  const now = useNow();
  if (Date.parse(at) <= now) return <Time at={at} show="relative" className="print:hidden" />;
  return (
    <time dateTime={at} className="print:hidden">
      just now
    </time>
  );
}

const words = {
  sending: 'being sent',
  waiting: 'waits for the connection; it is kept on this device and sent when it is back',
  stuck: 'was not taken by the server; it is kept on this device and tried again',
  'signed-out': 'not sent: the session has ended',
};

/** A note of the reader's own that the server has not answered for yet. */
export function OutgoingNoteEntry({ entry }: { entry: OutgoingEntry }) {
  const outbox = useOutbox();
  return (
    <div className="border-l-2 border-dashed border-edge pl-3">
      <p role="status" className="flex items-center gap-1.5 text-sm text-slate">
        <StateShape shape="ring" className="size-3.5 text-ochre" />
        <span>
          Your note {words[entry.state]}.{' '}
          {entry.state === 'signed-out' ? (
            <Link href={`/sign-in?next=${encodeURIComponent(globalThis.location?.pathname ?? '/today')}`}>
              Sign in again
            </Link>
          ) : null}
        </span>
      </p>
      {entry.state === 'stuck' ? (
        <Button onPress={() => void outbox.takeBack(entry.clientKey)}>Take it back</Button>
      ) : null}
      <NoteBody body={entry.body} />
    </div>
  );
}
