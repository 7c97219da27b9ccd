'use client';

import { Button } from '@/app/_components/button';
import { ErrorState } from '@/app/_components/error-state';
import { ProgressBar } from '@/app/_components/progress-bar';
import { asSentence, sentenceCase } from '@/app/_components/sentence-case';
import { stageName } from '@/lib/review/check-words';
import type { RevisionView } from '@/lib/review/schemas';
import { useOrderAgain } from '../_hooks/use-room-commands';
import { useCheckProgress } from '../_hooks/use-room-data';
import { useRoom } from './room-context';

/** The check while it runs, and why it did not finish; nothing once its findings are in the docket. */
export function CheckPanel({ revision }: { revision: RevisionView }) {
  const { check } = revision;
  const progress = useCheckProgress(revision);
  if (check.state === 'finished') return null;
  if (check.state === 'failed') return <FailedCheck revision={revision} />;
  const queued = check.state === 'queued' && progress.progress === 0;
  return (
    <section aria-label="Check run" className="border border-rule bg-sheet px-4 py-3 print:hidden">
      <ProgressBar
        label={queued ? 'Waits for the checker' : sentenceCase(stageName(progress.stage ?? 'Being checked'))}
        value={queued ? null : progress.progress}
        detail={queued ? 'in the queue' : undefined}
      />
      <p className="pt-1.5 text-sm text-slate">
        The findings come into the docket by themselves. Notes can be written meanwhile.
      </p>
    </section>
  );
}

function FailedCheck({ revision }: { revision: RevisionView }) {
  const { workspace } = useRoom();
  const again = useOrderAgain(workspace.id, revision.id, 'check');
  const mayOrder = revision.can.post && revision.state === 'in_review';
  return (
    <ErrorState
      title={`The check of revision ${revision.letter} did not finish`}
      actions={
        mayOrder ? (
          <Button isPending={again.isPending} onPress={() => again.mutate()}>
            Check again
          </Button>
        ) : null
      }
    >
      {asSentence(revision.check.error ?? 'The worker gave no reason.', revision.mesh.fileName)}{' '}
      {wayOn(revision, mayOrder)}
    </ErrorState>
  );
}

function wayOn({ state, author, can }: RevisionView, mayOrder: boolean): string {
  if (state !== 'in_review') return '';
  if (!mayOrder) return 'A designer or lead can have it checked again, or post the next revision.';
  return can.withdraw
    ? 'Have it checked again; if the reason names the mesh, withdraw the revision and post a mended one.'
    : `Have it checked again; if the reason names the mesh, post the next revision with a mended one, or ask ${author.name}, who posted this one.`;
}
