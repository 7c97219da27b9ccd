'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { api, explainError } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Dialog, DialogTrigger } from '@/app/_components/dialog';
import { FormProblem } from '@/app/_components/form-problem';
import { notify } from '@/app/_components/notices';

type Props = { apiPath: string; item: { id: string; name: string; version: number } };

/** Takes an item off its shelf, after asking. */
export function RemoveItem({ apiPath, item }: Props) {
  const router = useRouter();
  const [busy, setBusy] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);

  async function remove(close: () => void) {
    setBusy(true);
    setProblem(null);
    try {
      await api(`${apiPath}/${item.id}`, { method: 'DELETE', ifMatch: `"${item.version}"` });
      notify(`${item.name} was removed.`);
      close();
      router.refresh();
    } catch (error) {
      setProblem(explainError(error).detail);
    } finally {
      setBusy(false);
    }
  }

  return (
    <DialogTrigger onOpenChange={() => setProblem(null)}>
      <Button size="small" aria-label={`Remove ${item.name}`}>
        Remove
      </Button>
      <Dialog
        title={`Remove ${item.name}?`}
        role="alertdialog"
        size="narrow"
        isBusy={busy}
        actions={(close) => (
          <>
            <Button onPress={close}>Cancel</Button>
            <Button variant="danger" isPending={busy} onPress={() => void remove(close)}>
              Remove
            </Button>
          </>
        )}
      >
        <div className="flex flex-col gap-3">
          <p>New recipes no longer offer it. Recipes that were posted keep their values.</p>
          <FormProblem>{problem}</FormProblem>
        </div>
      </Dialog>
    </DialogTrigger>
  );
}
