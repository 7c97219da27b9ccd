'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { api, ApiError, explainError } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { Dialog } from '@/app/_components/dialog';
import { FormProblem } from '@/app/_components/form-problem';
import { notify } from '@/app/_components/notices';
import { Select } from '@/app/_components/select';
import { TextField } from '@/app/_components/text-field';
import type { StandInView } from '@/lib/review/stand-in-schemas';
import type { NameStandInProps } from './name-stand-in';

type Props = NameStandInProps & { isOpen: boolean; onOpenChange: (isOpen: boolean) => void };
type Errors = Partial<Record<'standInId' | 'fromOn' | 'untilOn', string>>;

/** From when to when the reader is away, and who signs for them. */
export function StandInDialog({ apiPath, today, role, choices, isOpen, onOpenChange }: Props) {
  const router = useRouter();
  const [standInId, setStandInId] = useState<string | null>(choices.length === 1 ? choices[0].id : null);
  const [fromOn, setFromOn] = useState(today);
  const [untilOn, setUntilOn] = useState('');
  const [errors, setErrors] = useState<Errors>({});
  const [problem, setProblem] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);

  async function send() {
    const missing: Errors = {
      ...(standInId ? {} : { standInId: 'Choose who signs for you.' }),
      ...(fromOn ? {} : { fromOn: 'Give the first day.' }),
      ...(untilOn ? {} : { untilOn: 'Give the last day.' }),
    };
    setErrors(missing);
    setProblem(null);
    if (Object.keys(missing).length) return;
    setBusy(true);
    try {
      const made = await api<StandInView>(apiPath, { method: 'POST', body: { standInId, fromOn, untilOn } });
      notify(`${made.standIn.name} signs for you in this workspace, and was told by mail.`);
      onOpenChange(false);
      router.refresh();
    } catch (error) {
      if (error instanceof ApiError)
        setErrors(Object.fromEntries(error.errors.map(({ pointer, detail }) => [pointer.slice(1), detail])));
      setProblem(explainError(error).detail);
    } finally {
      setBusy(false);
    }
  }

  return (
    <Dialog
      title="I will be away"
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      isBusy={busy}
      actions={(cancel) => (
        <>
          <Button onPress={cancel}>Cancel</Button>
          <Button variant="primary" isPending={busy} onPress={() => void send()}>
            Ask them to sign for me
          </Button>
        </>
      )}
    >
      <form
        noValidate
        className="flex flex-col gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          void send();
        }}
      >
        <Select
          label="Who signs for me"
          help={`Another ${role} of this workspace. Each signature names you both.`}
          options={choices.map(({ id, name }) => ({ value: id, label: name }))}
          value={standInId}
          onChange={setStandInId}
          error={errors.standInId}
        />
        <div className="grid gap-4 sm:grid-cols-2">
          <TextField
            label="First day"
            type="date"
            value={fromOn}
            onChange={setFromOn}
            error={errors.fromOn}
          />
          <TextField
            label="Last day"
            type="date"
            value={untilOn}
            onChange={setUntilOn}
            error={errors.untilOn}
          />
        </div>
        <FormProblem>{problem}</FormProblem>
        <button type="submit" hidden aria-hidden tabIndex={-1} />
      </form>
    </Dialog>
  );
}
