'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { ApiError, explainError, fieldName, newIdempotencyKey } from '../../../_components/api-client';
import { Button } from '../../../_components/button';
import { Controlled } from '../../../_components/controlled';
import { FormProblem } from '../../../_components/form-problem';
import { PasswordField } from '../../../_components/password-field';
import { TextField } from '../../../_components/text-field';
import { newPasswordHelp, newPasswordRules } from '../../../_components/new-password-rules';
import { browserZone } from '../../_components/browser-zone';
import { acceptInvitation } from './accept-invitation';

interface Values {
  name: string;
  password: string;
}

/** For the invited address when nobody is signed in: a new person sets a name and a password. */
export function JoinAsNewPerson({ token, email }: { token: string; email: string }) {
  const router = useRouter();
  const [key] = useState(newIdempotencyKey);
  const [problem, setProblem] = useState<string | null>(null);
  const { control, handleSubmit, formState, setError } = useForm<Values>({
    defaultValues: { name: '', password: '' },
  });

  async function join(values: Values) {
    setProblem(null);
    try {
      const path = await acceptInvitation(token, key, {
        ...values,
        name: values.name.trim().replace(/\s+/g, ' '),
        timeZone: browserZone(),
      });
      router.replace(path);
      router.refresh();
    } catch (error) {
      const problems = error instanceof ApiError ? error.errors : [];
      for (const { pointer, detail } of problems) {
        const name = fieldName(pointer);
        if (name === 'name' || name === 'password') setError(name, { message: detail });
      }
      setProblem(explainError(error).detail);
    }
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(join)} className="flex flex-col gap-4">
      <input type="email" name="email" value={email} autoComplete="username" readOnly hidden />
      <Controlled
        control={control}
        name="name"
        rules={{
          validate: (value) => value.trim().length > 0 || 'Write your name.',
          maxLength: { value: 80, message: 'Use 80 characters or fewer.' },
        }}
      >
        {(field) => (
          <TextField
            label="Your name"
            help="As it shall stand beside your signature."
            autoComplete="name"
            {...field}
          />
        )}
      </Controlled>
      <Controlled control={control} name="password" rules={newPasswordRules}>
        {(field) => (
          <PasswordField label="Password" help={newPasswordHelp} autoComplete="new-password" {...field} />
        )}
      </Controlled>
      <FormProblem>{problem}</FormProblem>
      <Button
        type="submit"
        variant="primary"
        size="roomy"
        isPending={formState.isSubmitting}
        className="self-start"
      >
        Join as {email}
      </Button>
    </form>
  );
}
