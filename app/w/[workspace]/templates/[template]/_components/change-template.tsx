'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { api, explainError } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Dialog, DialogTrigger } from '@/app/_components/dialog';
import { TextField } from '@/app/_components/text-field';
import { titleTooLong } from '../../../_components/title-too-long';

type Props = { path: string; title: string; dueOn: string | null; version: number };

/** Title and due date of a template; what was agreed on its revisions stays as it was. */
export function ChangeTemplate(props: Props) {
  const router = useRouter();
  const [title, setTitle] = useState(props.title);
  const [dueOn, setDueOn] = useState(props.dueOn ?? '');
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string>();

  async function save(close: () => void) {
    setBusy(true);
    setTrouble(undefined);
    try {
      await api(props.path, {
        method: 'PATCH',
        body: { title, dueOn: dueOn || null, version: props.version },
      });
      close();
      router.refresh();
    } catch (error) {
      setTrouble(explainError(error).detail);
    } finally {
      setBusy(false);
    }
  }

  return (
    <DialogTrigger>
      <Button>Change title or date</Button>
      <Dialog
        title="Title and due date"
        isBusy={busy}
        actions={(close) => (
          <>
            <Button onPress={close}>Cancel</Button>
            <Button
              variant="primary"
              isPending={busy}
              isDisabled={!title.trim() || titleTooLong(title) !== undefined}
              onPress={() => void save(close)}
            >
              Save
            </Button>
          </>
        )}
      >
        <div className="flex flex-col gap-4">
          <TextField
            label="Title"
            value={title}
            onChange={setTitle}
            isRequired
            error={titleTooLong(title) ?? trouble}
          />
          <TextField label="Due on" type="date" value={dueOn} onChange={setDueOn} optional />
        </div>
      </Dialog>
    </DialogTrigger>
  );
}
