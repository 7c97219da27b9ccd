'use client';

import { useState } from 'react';
import { ApiError, explainError } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Dialog, DialogTrigger } from '@/app/_components/dialog';
import { notify } from '@/app/_components/notices';
import { TextArea } from '@/app/_components/text-field';
import { WaiveInput, type FindingView } from '@/lib/review/schemas';
import { useWaive } from '../_hooks/use-room-commands';
import { keepFocus } from './keep-focus';
import { MetaButton } from './meta-button';
import { useRoom } from './room-context';

/** A lead lets a failing finding stand; the reason is shown with it for ever after. */
export function WaiveDialog({ finding, itemKey }: { finding: FindingView; itemKey: string }) {
  const { workspace, revision } = useRoom();
  const [reason, setReason] = useState('');
  const [error, setError] = useState<string>();
  const waive = useWaive(workspace.id, revision.id);
  const submit = (close: () => void) => {
    const parsed = WaiveInput.safeParse({ reason });
    if (!parsed.success) return setError(parsed.error.issues[0].message);
    setError(undefined);
    waive.mutate(
      { findingId: finding.id, reason: parsed.data.reason, onShown: keepFocus(itemKey) },
      {
        onSuccess: () => {
          notify('The finding is waived. Your reason stands beside it.');
          close();
        },
        onError: (problem) => {
          const field = problem instanceof ApiError ? problem.errors[0]?.detail : undefined;
          setError(field ?? explainError(problem).detail);
        },
      },
    );
  };
  return (
    <DialogTrigger>
      <MetaButton>waive with a reason</MetaButton>
      <Dialog
        title="Let this finding stand"
        isBusy={waive.isPending}
        actions={(close) => (
          <>
            <Button onPress={close} isDisabled={waive.isPending}>
              Cancel
            </Button>
            <Button variant="primary" isPending={waive.isPending} onPress={() => submit(close)}>
              Waive the finding
            </Button>
          </>
        )}
      >
        <div className="flex flex-col gap-4">
          <p className="border-l-4 border-madder pl-3">{finding.message}</p>
          <p>
            The finding no longer keeps the forming gate shut. Your name and your reason are shown with it
            from now on, to the client too, and are part of what is signed.
          </p>
          <TextArea
            label="Why it may stand"
            help="For example what was tried, or what the shop does about it."
            value={reason}
            onChange={setReason}
            error={error}
            isRequired
            maxLength={1000}
          />
        </div>
      </Dialog>
    </DialogTrigger>
  );
}
