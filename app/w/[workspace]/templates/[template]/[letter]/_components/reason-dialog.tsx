'use client';

import { useState } from 'react';
import { explainError } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Dialog } from '@/app/_components/dialog';
import { notify } from '@/app/_components/notices';
import { TextArea } from '@/app/_components/text-field';
import { ReasonInput } from '@/lib/review/schemas';
import { useEndRevision, type Step } from '../_hooks/use-room-commands';
import { useRoom } from './room-context';

const words: Record<Step, { title: string; what: string; label: string; action: string; done: string }> = {
  withdraw: {
    title: 'Withdraw this revision',
    what: 'It closes unsigned. Its files, findings and notes stay readable; open items travel to the next revision.',
    label: 'Why it is withdrawn',
    action: 'Withdraw it',
    done: 'The revision is withdrawn.',
  },
  recall: {
    title: 'Recall this revision',
    what: 'Production is told to stop printing and forming from it. What was agreed stays as it is.',
    label: 'Why it is recalled',
    action: 'Recall it',
    done: 'The revision is recalled. The people concerned get a mail.',
  },
  retire: {
    title: 'Retire this revision',
    what: 'It is no longer used for production. What was agreed stays as it is.',
    label: 'Why it is retired',
    action: 'Retire it',
    done: 'The revision is retired.',
  },
};

/** Ends a revision's way with a reason that stays on record. */
export function ReasonDialog(props: {
  step: Step;
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
}) {
  const { step, isOpen, onOpenChange } = props;
  const { workspace, revision } = useRoom();
  const [reason, setReason] = useState('');
  const [error, setError] = useState<string>();
  const end = useEndRevision(workspace.id, revision.id, step);
  const word = words[step];
  const submit = () => {
    const parsed = ReasonInput.safeParse({ reason });
    if (!parsed.success) return setError(parsed.error.issues[0].message);
    setError(undefined);
    end.mutate(parsed.data.reason, {
      onSuccess: () => {
        notify(word.done);
        setReason('');
        onOpenChange(false);
      },
      onError: (problem) => setError(explainError(problem).detail),
    });
  };
  return (
    <Dialog
      title={word.title}
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      isBusy={end.isPending}
      actions={(close) => (
        <>
          <Button onPress={close} isDisabled={end.isPending}>
            Cancel
          </Button>
          <Button variant="danger" isPending={end.isPending} onPress={submit}>
            {word.action}
          </Button>
        </>
      )}
    >
      <div className="flex flex-col gap-4">
        <p>
          Revision {revision.letter} of {revision.template.number}, {revision.template.title}. {word.what}
        </p>
        <TextArea
          label={word.label}
          value={reason}
          onChange={setReason}
          error={error}
          isRequired
          maxLength={2000}
        />
      </div>
    </Dialog>
  );
}
