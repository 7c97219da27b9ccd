'use client';

import clsx from 'clsx';
import { useState } from 'react';
import { NoteComposer } from '@/app/_components/note-editor/note-composer';
import { useOutgoing } from '@/app/_components/note-editor/outbox-provider';
import { StateShape } from '@/app/_components/state-shape';
import { states, type State } from '@/app/_components/status-word';
import { checkName } from '@/lib/review/check-words';
import type { FindingView } from '@/lib/review/schemas';
import type { DocketItem } from './docket-items';
import { FindingCard } from './finding-card';
import { MetaButton } from './meta-button';
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

function wordOf({ finding, thread }: DocketItem, state: State): string {
  if (finding?.status === 'not-run') return 'not checked';
  if (!finding && thread?.mustSettle && thread.state === 'open') return 'note, must settle';
  return states[state].word;
}

/** One item of the docket: a finding with its answers, or a thread of its own. */
export function DocketEntry({ item, level = 3 }: { item: DocketItem; level?: 3 | 4 }) {
  const { finding, thread, key } = item;
  const { active, activate } = useRoom();
  const { state, tone } = markOf(item);
  const word = wordOf(item, state);
  const isQuiet = item.group === 'fine' || item.group === 'unchecked';
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
        'scroll-mt-4 border-b border-rule outline-offset-0 break-inside-avoid',
        isQuiet ? 'py-1.5' : 'py-3',
        active === key && '-mx-3 border-l-2 border-l-verdigris bg-sheet pr-3 pl-2.5',
      )}
    >
      <div className="flex gap-2.5">
        <StateShape shape={states[state].shape} className={clsx('mt-1 size-4', tones[tone])} />
        <div className={clsx('flex min-w-0 grow flex-col', isQuiet ? 'gap-0.5' : 'gap-1.5')}>
          <Heading
            className={clsx('text-base', isQuiet ? 'font-normal' : 'font-semibold', !finding && 'sr-only')}
          >
            <span className="sr-only">{word}: </span>
            {finding ? finding.message : threadTitle(item)}
          </Heading>
          {finding ? (
            <FindingItem item={item} finding={finding} />
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

/** A finding, its answers below it, and what can be done: answer it while nobody has, or waive it. */
function FindingItem({ item, finding }: { item: DocketItem; finding: FindingView }) {
  const { workspace, revision, reader, people, hasDraft } = useRoom();
  const [answering, setAnswering] = useState(false);
  const waiting = useOutgoing(revision.id).filter((e) => e.findingId === finding.id && !e.threadId);
  const wasRun = finding.status !== 'not-run';
  const mayAnswer = wasRun && revision.can.note && !item.thread && !revision.lockedAt && waiting.length === 0;
  const mayWaive = revision.can.waive && finding.status === 'fail' && !finding.waiver;
  return (
    <>
      <FindingCard
        finding={finding}
        itemKey={item.key}
        actions={
          <>
            {mayAnswer && !answering ? (
              <MetaButton onPress={() => setAnswering(true)}>
                {hasDraft(`finding-${finding.id}`) ? 'go on with your answer' : 'answer'}
              </MetaButton>
            ) : null}
            {mayWaive ? <WaiveDialog finding={finding} itemKey={item.key} /> : null}
          </>
        }
      />
      {item.thread ? (
        <div className="mt-1 border-l-2 border-rule pl-3">
          <ThreadCard thread={item.thread} itemKey={item.key} />
        </div>
      ) : null}
      {waiting.map((entry) => (
        <OutgoingNoteEntry key={entry.clientKey} entry={entry} />
      ))}
      {answering ? (
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
      ) : null}
    </>
  );
}
