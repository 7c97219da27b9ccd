'use client';

import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { authClient } from '../../../_components/auth-client';
import { Button } from '../../../_components/button';
import { Controlled } from '../../../_components/controlled';
import { askAuth } from '../../../_components/explain-auth';
import { FormProblem } from '../../../_components/form-problem';
import { PasswordField } from '../../../_components/password-field';

interface AskPasswordProps<T> {
  email: string;
  /** Endpoint of the sign-in service that is given the password. */
  path: string;
  action: string;
  isDanger?: boolean;
  onAnswer: (answer: T) => void;
  onCancel: () => void;
}

/** Asks for the password again, and sends it along with what is to be done. */
export function AskPassword<T>({ email, path, action, isDanger, onAnswer, onCancel }: AskPasswordProps<T>) {
  const [problem, setProblem] = useState<string | null>(null);
  const { control, handleSubmit, formState, setError } = useForm({ defaultValues: { password: '' } });

  async function send({ password }: { password: string }) {
    setProblem(null);
    const answer = await askAuth(() => authClient.$fetch<T>(path, { method: 'POST', body: { password } }));
    if (answer.refusal?.code === 'INVALID_PASSWORD' && answer.problem)
      setError('password', { message: answer.problem }, { shouldFocus: true });
    else if (answer.problem) setProblem(answer.problem);
    else onAnswer(answer.data as T);
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(send)} className="flex w-full flex-col gap-4">
      <input type="email" name="email" value={email} autoComplete="username" readOnly hidden />
      <Controlled control={control} name="password" rules={{ required: 'Write your password.' }}>
        {(field) => (
          <PasswordField label="Your password" autoComplete="current-password" autoFocus {...field} />
        )}
      </Controlled>
      <FormProblem>{problem}</FormProblem>
      <div className="flex flex-wrap gap-3">
        <Button onPress={onCancel} isDisabled={formState.isSubmitting}>
          Leave it
        </Button>
        <Button type="submit" variant={isDanger ? 'danger' : 'primary'} isPending={formState.isSubmitting}>
          {action}
        </Button>
      </div>
    </form>
  );
}
