'use client';

import dynamic from 'next/dynamic';
import { useState, type ReactNode } from 'react';
import { Button } from '../button';
import { Checkbox } from '../checkbox';
import { SkeletonBlock } from '../skeleton';
import type { Mentionable } from './filter-people';
import { isBlank } from './is-blank';
import { draftKey } from './note-draft';
import { useOutbox } from './outbox-provider';
import { useNoteDraft, type NoteDraftHandle } from './use-note-draft';

// The editor is the heaviest part of the page after the stage: it comes when somebody starts to write.
const NoteEditor = dynamic(() => import('./note-editor').then((module) => module.NoteEditor), {
  ssr: false,
  loading: () => <SkeletonBlock className="h-28" label="The editor is on its way" />,
});

export interface NoteComposerProps {
  personId: string;
  workspaceId: string;
  revisionId: string;
  /** The thread that is answered … */
  threadId?: string;
  /** … or the finding, when nobody has answered it yet; neither opens a new thread. */
  findingId?: string;
  people: readonly Mentionable[];
  label: string;
  placeholder: string;
  sendLabel: string;
  autoFocus?: boolean;
  /** Offers "must be settled before the next gate". */
  offersMustSettle?: boolean;
  /** Shown between text and buttons, such as the pin's place; gets the draft to read and change its pin. */
  children?: (handle: Pick<NoteDraftHandle, 'draft' | 'change'>) => ReactNode;
  onSent?: () => void;
  onCancel?: () => void;
}

/** Writes one note: kept on this device as it is typed, posted once, queued without a connection. */
export function NoteComposer(props: NoteComposerProps) {
  const { personId, workspaceId, revisionId, threadId, findingId, people } = props;
  const key = draftKey(personId, revisionId, threadId ?? (findingId ? `finding-${findingId}` : 'new'));
  const { draft, ready, generation, change, clear } = useNoteDraft(key);
  const outbox = useOutbox();
  const [hint, setHint] = useState<string | null>(null);
  const isEmpty = !draft || isBlank(draft.body);

  const send = async () => {
    if (!draft || isEmpty) {
      setHint('Write something first.');
      return;
    }
    setHint(null);
    const { body, clientKey, mustSettle, pin } = draft;
    await clear();
    props.onSent?.();
    await outbox.add({
      clientKey,
      personId,
      workspaceId,
      revisionId,
      threadId: threadId ?? null,
      findingId: threadId ? null : (findingId ?? null),
      pin: threadId ? null : pin,
      mustSettle: threadId ? false : mustSettle,
      body,
      draftKey: key,
      writtenAt: Date.now(),
    });
  };

  return (
    <div className="flex flex-col gap-2 print:hidden">
      {draft?.refusal ? (
        <p role="alert" className="flex gap-2 border-l-4 border-madder bg-madder-wash px-3 py-2 text-sm">
          <span aria-hidden className="text-madder">
            ▲
          </span>
          <span>This was not posted: {draft.refusal} Your text is kept here.</span>
        </p>
      ) : null}
      {ready ? (
        <NoteEditor
          label={props.label}
          placeholder={props.placeholder}
          people={people}
          body={draft?.body ?? null}
          generation={generation}
          autoFocus={props.autoFocus}
          onChange={(body) => {
            setHint(null);
            change({ body });
          }}
          onSend={() => void send()}
          onLeave={props.onCancel}
        />
      ) : (
        <SkeletonBlock className="h-28" label="The editor is on its way" />
      )}
      {props.children?.({ draft, change })}
      {props.offersMustSettle ? (
        <Checkbox
          label="Must be settled before the next gate"
          value={draft?.mustSettle ?? false}
          onChange={(mustSettle) => change({ mustSettle })}
        />
      ) : null}
      <div className="flex flex-wrap items-center gap-2">
        <Button variant="primary" size="small" onPress={() => void send()}>
          {props.sendLabel}
        </Button>
        {props.onCancel ? (
          <Button variant="plain" size="small" onPress={props.onCancel}>
            Close
          </Button>
        ) : null}
        {!isEmpty ? (
          <Button variant="plain" size="small" onPress={() => void clear()}>
            Discard
          </Button>
        ) : null}
        <span role="status" className="text-sm text-slate">
          {hint ?? (isEmpty ? '' : 'Draft kept on this device.')}
        </span>
      </div>
    </div>
  );
}
