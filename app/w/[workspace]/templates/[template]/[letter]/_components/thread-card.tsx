'use client';

import { useState } from 'react';
import { Figure } from '@/app/_components/figure';
import { convertLength } from '@/app/_components/format-figure';
import { NoteComposer } from '@/app/_components/note-editor/note-composer';
import { useOutgoing } from '@/app/_components/note-editor/outbox-provider';
import { usePreferences } from '@/app/_components/preferences-context';
import { Time } from '@/app/_components/time';
import type { ThreadView } from '@/lib/review/schemas';
import { useSettle } from '../_hooks/use-room-commands';
import { keepFocus } from './keep-focus';
import { MetaButton } from './meta-button';
import { NoteEntry, OutgoingNoteEntry } from './note-entry';
import { PlaceLinks } from './place-links';
import { useRoom } from './room-context';

/** Notes in the order they were said, where they are pinned, and what can be done: reply, settle, open again. */
export function ThreadCard({ thread, itemKey }: { thread: ThreadView; itemKey: string }) {
  const { workspace, revision, reader, people, hasDraft } = useRoom();
  const [replying, setReplying] = useState(false);
  const settle = useSettle(workspace.id, revision.id);
  const outgoing = useOutgoing(revision.id).filter((entry) => entry.threadId === thread.id);
  const mayReply = revision.can.note && (thread.state === 'open' || thread.afterApproval);
  const first = thread.notes[0];
  return (
    <div className="flex flex-col gap-2.5">
      {thread.notes.map((note) => (
        <NoteEntry key={note.id} note={note} />
      ))}
      {outgoing.map((entry) => (
        <OutgoingNoteEntry key={entry.clientKey} entry={entry} />
      ))}
      <ThreadFacts thread={thread} letter={revision.letter} />
      {replying ? (
        <NoteComposer
          personId={reader.id}
          workspaceId={workspace.id}
          revisionId={revision.id}
          threadId={thread.id}
          people={people}
          label={`Reply to ${first?.authorName ?? 'this thread'}`}
          placeholder="Write a reply"
          sendLabel="Post the reply"
          autoFocus
          onSent={() => setReplying(false)}
          onCancel={() => setReplying(false)}
        />
      ) : (
        <div className="flex flex-wrap items-baseline gap-x-3.5 text-sm text-slate">
          {thread.pin ? <PlaceLinks places={[{ at: thread.pin.at }]} itemKey={itemKey} /> : null}
          {mayReply ? (
            <MetaButton onPress={() => setReplying(true)}>
              {hasDraft(thread.id) ? 'go on with your reply' : 'reply'}
            </MetaButton>
          ) : null}
          {revision.can.settle || thread.afterApproval ? (
            <MetaButton
              isPending={settle.isPending}
              onPress={() =>
                settle.mutate({ thread, settled: thread.state === 'open', onShown: keepFocus(itemKey) })
              }
            >
              {thread.state === 'open' ? 'settle' : 'open again'}
            </MetaButton>
          ) : null}
        </div>
      )}
    </div>
  );
}

/** Who settled it and when, whether it was carried over from an earlier revision, and how its pin fared. */
function ThreadFacts({ thread, letter }: { thread: ThreadView; letter: string }) {
  const { units } = usePreferences();
  const carried = thread.openedOn !== letter;
  const distance = thread.distanceMm;
  if (!carried && thread.state === 'open' && !thread.mustSettle) return null;
  return (
    <p className="flex flex-wrap gap-x-3 text-sm text-slate">
      {thread.mustSettle && thread.state === 'open' ? (
        <span className="text-madder">must be settled before the next gate</span>
      ) : null}
      {carried ? (
        <span>
          carried over from revision {thread.openedOn}
          {thread.standing === 'lost' ? ', its place is no longer on the model' : ''}
          {thread.standing === 'moved' && distance !== null ? (
            <>
              , its place moved <Figure {...convertLength(distance, units, 1)} />
            </>
          ) : null}
          {thread.standing === 'kept' ? ', its place is as it was' : ''}
        </span>
      ) : null}
      {thread.state === 'settled' && thread.settledAt ? (
        <span>
          settled by {thread.settledByName}, <Time at={thread.settledAt} show="moment" />
        </span>
      ) : null}
    </p>
  );
}
