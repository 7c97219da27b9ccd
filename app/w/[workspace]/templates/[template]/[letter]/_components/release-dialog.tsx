'use client';

import { useState } from 'react';
import { ApiError, explainError, newIdempotencyKey } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Caution } from '@/app/_components/caution';
import { Dialog } from '@/app/_components/dialog';
import { Digest } from '@/app/_components/digest';
import { notify } from '@/app/_components/notices';
import { TextArea } from '@/app/_components/text-field';
import { ReleaseInput } from '@/lib/review/schemas';
import { useRelease } from '../_hooks/use-room-commands';
import { useRoom } from './room-context';

/** Hands the agreed revision to production: shows the cautions, builds the pack, tells the people concerned. */
export function ReleaseDialog({
  isOpen,
  onOpenChange,
}: {
  isOpen: boolean;
  onOpenChange: (o: boolean) => void;
}) {
  const { workspace, revision } = useRoom();
  const [note, setNote] = useState('');
  const [error, setError] = useState<string>();
  const [key, setKey] = useState(newIdempotencyKey);
  const release = useRelease(workspace.id, revision.id);
  const submit = () => {
    const parsed = ReleaseInput.safeParse({ note });
    if (!parsed.success) return setError(parsed.error.issues[0].message);
    setError(undefined);
    release.mutate(
      { note: parsed.data.note, key },
      {
        onSuccess: () => {
          notify('Released. The pack is being built; the people concerned get a mail.');
          onOpenChange(false);
        },
        onError: (problem) => {
          if (problem instanceof ApiError && problem.status !== 0) setKey(newIdempotencyKey());
          setError(explainError(problem).detail);
        },
      },
    );
  };
  return (
    <Dialog
      title={`Release revision ${revision.letter} of ${revision.template.number}`}
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      isBusy={release.isPending}
      actions={(close) => (
        <>
          <Button size="roomy" onPress={close} isDisabled={release.isPending}>
            Cancel
          </Button>
          <Button size="roomy" variant="primary" isPending={release.isPending} onPress={submit}>
            Release to production
          </Button>
        </>
      )}
    >
      <div className="flex flex-col gap-4">
        <p>
          The release pack holds the mesh’s exact bytes, the recipe, the report, the signatures and check
          sums. It is built for this content and no other:
          {revision.contentDigest ? (
            <span className="mt-1 block">
              <Digest value={revision.contentDigest} characters="all" className="text-sm" />
            </span>
          ) : null}
        </p>
        <Caution title="Before anybody forms from it">
          Forming means hot sheet, hot tools, compressed air and fumes; formed parts may touch food. Every
          temperature, pressure and life in the recipe and the report is an estimate, to be proven by a test
          pull. Follow the documents of the machine, the sheet and the filament, and the codes that hold at
          the place; leave licensed work to those who are licensed.
        </Caution>
        <TextArea
          label="Note to production"
          optional
          value={note}
          onChange={setNote}
          error={error}
          maxLength={2000}
          roomy
        />
      </div>
    </Dialog>
  );
}
