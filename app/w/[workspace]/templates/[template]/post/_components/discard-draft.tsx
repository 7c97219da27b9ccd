'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { api, explainError } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Dialog } from '@/app/_components/dialog';
import { notify } from '@/app/_components/notices';

type Props = { apiPath: string; templatePath: string; letter: string; onDiscarded: () => void };

/** Throws the draft away after a question, and leads back to the template. */
export function DiscardDraft({ apiPath, templatePath, letter, onDiscarded }: Props) {
  const router = useRouter();
  const [isOpen, setOpen] = useState(false);
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);

  async function discard() {
    setBusy(true);
    setTrouble(null);
    try {
      await api(apiPath, { method: 'DELETE' });
      onDiscarded();
      notify('The draft is discarded.');
      router.push(templatePath);
      router.refresh();
    } catch (error) {
      setTrouble(explainError(error).detail);
      setBusy(false);
    }
  }

  return (
    <>
      <Button variant="plain" onPress={() => setOpen(true)}>
        Discard the draft
      </Button>
      <Dialog
        title="Discard the draft"
        role="alertdialog"
        size="narrow"
        isOpen={isOpen}
        onOpenChange={setOpen}
        isBusy={busy}
        actions={(close) => (
          <>
            <Button isDisabled={busy} onPress={close}>
              Keep it
            </Button>
            <Button variant="danger" isPending={busy} onPress={() => void discard()}>
              Discard it
            </Button>
          </>
        )}
      >
        <p>
          The file, the recipe and the text for revision {letter} are dropped, for everyone who works on this
          draft. Posted revisions stay as they are.
        </p>
        {trouble ? (
          <p role="alert" className="mt-3 text-sm font-medium text-madder">
            {trouble}
          </p>
        ) : null}
      </Dialog>
    </>
  );
}
