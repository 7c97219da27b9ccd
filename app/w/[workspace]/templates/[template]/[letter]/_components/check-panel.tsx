'use client';

import { ErrorState } from '@/app/_components/error-state';
import { ProgressBar } from '@/app/_components/progress-bar';
import type { RevisionView } from '@/lib/review/schemas';
import { useCheckProgress } from '../_hooks/use-room-data';

/** The check while it runs, and why it did not finish; nothing once its findings are in the docket. */
export function CheckPanel({ revision }: { revision: RevisionView }) {
  const { check } = revision;
  const progress = useCheckProgress(revision);
  if (check.state === 'finished') return null;
  if (check.state === 'failed') {
    return (
      <ErrorState title={`The check of revision ${revision.letter} did not finish`}>
        {check.error ?? 'The worker gave no reason.'}{' '}
        {revision.can.withdraw
          ? 'Withdraw the revision and post it again, with a mended mesh if the reason names one.'
          : 'The studio can withdraw the revision and post it again.'}
      </ErrorState>
    );
  }
  const queued = check.state === 'queued' && progress.progress === 0;
  return (
    <section aria-label="Check run" className="border border-rule bg-sheet px-4 py-3 print:hidden">
      <ProgressBar
        label={queued ? 'Waits for the checker' : sentence(progress.stage ?? 'Being checked')}
        value={queued ? null : progress.progress}
        detail={queued ? 'in the queue' : undefined}
      />
      <p className="pt-1.5 text-sm text-slate">
        The findings come into the docket by themselves. Notes can be written meanwhile.
      </p>
    </section>
  );
}

const sentence = (words: string) => words.charAt(0).toUpperCase() + words.slice(1);
