'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { Button } from '../../../_components/button';
import { Controlled } from '../../../_components/controlled';
import { FormProblem } from '../../../_components/form-problem';
import { notify } from '../../../_components/notices';
import { TextField } from '../../../_components/text-field';
import { updatePerson } from './update-person';

export function NameForm({ name, email }: { name: string; email: string }) {
  const router = useRouter();
  const [problem, setProblem] = useState<string | null>(null);
  const { control, handleSubmit, formState, reset } = useForm({ defaultValues: { name } });

  async function save(values: { name: string }) {
    const next = values.name.trim().replace(/\s+/g, ' ');
    const failed = await updatePerson({ name: next });
    setProblem(failed);
    if (failed) return;
    reset({ name: next });
    notify('Your name was changed.');
    router.refresh();
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(save)} className="flex flex-col gap-4">
      <Controlled
        control={control}
        name="name"
        rules={{
          validate: (value) => value.trim().length > 0 || 'Write your name.',
          maxLength: { value: 80, message: 'Use 80 characters or fewer.' },
        }}
      >
        {(field) => <TextField label="Name" autoComplete="name" {...field} />}
      </Controlled>
      <TextField
        label="E-mail"
        value={email}
        isReadOnly
        help="Signatures and invitations hang on this address, so it stays. For another one, ask a lead to invite it."
      />
      <FormProblem>{problem}</FormProblem>
      <Button type="submit" className="self-start" isPending={formState.isSubmitting}>
        Save the name
      </Button>
    </form>
  );
}
