'use client';

import { useRouter } from 'next/navigation';
import { useRef, useState } from 'react';
import { api, ApiError, explainError, newIdempotencyKey } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Dialog, DialogTrigger } from '@/app/_components/dialog';
import { TextField } from '@/app/_components/text-field';
import { longestTitle, titleTooLong } from './title-too-long';

type Props = { apiPath: string; homePath: string; code: string };

/** Opens a template: a title and a due date; the number is the next of the workspace. */
export function NewTemplate({ apiPath, homePath, code }: Props) {
  const router = useRouter();
  const [title, setTitle] = useState('');
  const [dueOn, setDueOn] = useState('');
  const [busy, setBusy] = useState(false);
  const [errors, setErrors] = useState<Record<string, string>>({});
  const key = useRef(newIdempotencyKey());

  async function create(close: () => void) {
    setBusy(true);
    setErrors({});
    try {
      const made = await api<{ id: string }>(`${apiPath}/templates`, {
        body: { title, dueOn: dueOn || null },
        idempotencyKey: key.current,
      });
      close();
      router.push(`${homePath}/templates/${made.id}/post`);
    } catch (error) {
      key.current = newIdempotencyKey();
      const fields = error instanceof ApiError ? error.errors : [];
      setErrors(
        fields.length
          ? Object.fromEntries(fields.map(({ pointer, detail }) => [pointer.slice(1), detail]))
          : { title: explainError(error).detail },
      );
    } finally {
      setBusy(false);
    }
  }

  return (
    <DialogTrigger>
      <Button variant="primary">New template</Button>
      <Dialog
        title="New template"
        isBusy={busy}
        actions={(close) => (
          <>
            <Button onPress={close}>Cancel</Button>
            <Button
              variant="primary"
              isPending={busy}
              isDisabled={!title.trim() || titleTooLong(title) !== undefined}
              onPress={() => void create(close)}
            >
              Open template
            </Button>
          </>
        )}
      >
        <div className="flex flex-col gap-4">
          <p className="text-sm text-slate">It gets the next number of this workspace, {code}-…</p>
          <TextField
            label="Title"
            help={`What the part is called, at most ${longestTitle} characters.`}
            value={title}
            onChange={setTitle}
            isRequired
            error={titleTooLong(title) ?? errors.title}
            autoFocus
          />
          <TextField
            label="Due on"
            type="date"
            value={dueOn}
            onChange={setDueOn}
            error={errors.dueOn}
            optional
          />
        </div>
      </Dialog>
    </DialogTrigger>
  );
}
