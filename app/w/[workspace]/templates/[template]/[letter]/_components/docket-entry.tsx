'use client';

import clsx from 'clsx';
import { useState } from 'react';
import { Button } from '@/app/_components/button';
import { NoteComposer } from '@/app/_components/note-editor/note-composer';
import { useOutgoing } from '@/app/_components/note-editor/outbox-provider';
import { StateShape } from '@/app/_components/state-shape';
import { states, type State } from '@/app/_components/status-word';
import { checkName } from './check-names';
import type { DocketItem } from './docket-items';
import { FindingBasis, FindingCard } from './finding-card';
import { OutgoingNoteEntry } from './note-entry';
import { useRoom } from './room-context';
import { ThreadCard } from './thread-card';
import { WaiveDialog } from './waive-dialog';

const tones: Record<string, string> = {
  madder: 'text-madder',
  ochre: 'text-ochre',
  verdigris: 'text-verdigris',
  ink: 'text-ink',
  slate: 'text-slate',
};

function markOf({ finding, thread, group }: DocketItem): { state: State; tone: string } {
  if (finding?.waiver) return { state: 'waived', tone: 'ochre' };
  if (group === 'settled') return { state: 'settled', tone: 'ink' };
  if (finding?.status === 'fail') return { state: 'must-settle', tone: 'madder' };
  if (finding?.status === 'caution') return { state: 'look-at', tone: 'ochre' };
  if (finding?.status === 'pass') return { state: 'passed', tone: 'ink' };
  if (finding) return { state: 'ahead', tone: 'slate' };
  return { state: 'note', tone: thread?.mustSettle ? 'madder' : 'ink' };
}

const notChecked = 'not checked';

/** One item of the docket: a finding with its answers, or a thread of its own. */
export function DocketEntry({ item, level = 3 }: { item: DocketItem; level?: 3 | 4 }) {
  const { finding, thread, key } = item;
  const { active, activate, revision } = useRoom();
  const { state, tone } = markOf(item);
  const word =
    finding?.status === 'not-run' ? notChecked : thread && !finding && thread.mustSettle && thread.state === 'open' ? 'note, must settle' : states[state].word; // prettier-ignore
  const Heading = `h${level}` as const;
  return (
    <li
      id={key}
      tabIndex={-1}
      aria-current={active === key ? 'true' : undefined}
      onClickCapture={() => {
        if (active !== key) activate(key);
      }}
      className={clsx(
        'scroll-mt-4 border-b border-rule py-3 outline-offset-4 break-inside-avoid',
        active === key && '-mx-3 border-l-2 border-l-verdigris bg-sheet pr-3 pl-2.5',
      )}
    >
      <div className="flex gap-2.5">
        <StateShape shape={states[state].shape} className={clsx('mt-1 size-4', tones[tone])} />
        <div className="flex min-w-0 grow flex-col gap-1.5">
          <Heading className={clsx('text-base font-semibold', !finding && 'sr-only')}>
            <span className="sr-only">{word}: </span>
            {finding ? finding.message : threadTitle(item)}
          </Heading>
          {finding ? (
            <>
              <FindingCard finding={finding} itemKey={key} />
              {thread ? (
                <div className="mt-1 border-l-2 border-rule pl-3">
                  <ThreadCard thread={thread} itemKey={key} />
                </div>
              ) : null}
              <FindingActions item={item} canNote={revision.can.note} />
              <FindingBasis finding={finding} />
            </>
          ) : thread ? (
            <ThreadCard thread={thread} itemKey={key} />
          ) : null}
        </div>
      </div>
    </li>
  );
}

function threadTitle({ thread }: DocketItem): string {
  const first = thread?.notes[0];
  if (!first) return 'Note';
  const words = first.text.length > 80 ? `${first.text.slice(0, 77)}…` : first.text;
  return `${first.authorName}: ${words}`;
}

/** Answering a finding that nobody has answered, and waiving it. */
function FindingActions({ item, canNote }: { item: DocketItem; canNote: boolean }) {
  const { workspace, revision, reader, people } = useRoom();
  const [answering, setAnswering] = useState(false);
  const finding = item.finding!;
  const waiting = useOutgoing(revision.id).filter((e) => e.findingId === finding.id && !e.threadId);
  const mayAnswer = canNote && !item.thread && !revision.lockedAt && waiting.length === 0;
  const mayWaive = revision.can.waive && finding.status === 'fail' && !finding.waiver;
  if (answering) {
    return (
      <NoteComposer
        personId={reader.id}
        workspaceId={workspace.id}
        revisionId={revision.id}
        findingId={finding.id}
        people={people}
        label={`Answer to the finding on ${checkName(finding.checkId).toLowerCase()}`}
        placeholder="Answer this finding"
        sendLabel="Post the answer"
        autoFocus
        onSent={() => setAnswering(false)}
        onCancel={() => setAnswering(false)}
      />
    );
  }
  return (
    <>
      {waiting.map((entry) => (
        <OutgoingNoteEntry key={entry.clientKey} entry={entry} />
      ))}
      {mayAnswer || mayWaive ? (
        <div className="-ml-2.5 flex flex-wrap gap-1 print:hidden">
          {mayAnswer ? (
            <Button variant="plain" size="small" onPress={() => setAnswering(true)}>
              Answer
            </Button>
          ) : null}
          {mayWaive ? <WaiveDialog finding={finding} /> : null}
        </div>
      ) : null}
    </>
  );
}
