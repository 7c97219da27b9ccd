'use client';

import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { authClient } from '../../../_components/auth-client';
import { Button } from '../../../_components/button';
import { CodeField } from '../../../_components/code-field';
import { Controlled } from '../../../_components/controlled';
import { askAuth } from '../../../_components/explain-auth';
import { FormProblem } from '../../../_components/form-problem';
import { PasswordField } from '../../../_components/password-field';

interface AskPasswordProps<T> {
  email: string;
  /** Endpoint of the sign-in service that is given the password. */
  path: string;
  action: string;
  /** Also for a code of the second factor that is on, or a recovery code. */
  withCode?: boolean;
  isDanger?: boolean;
  onAnswer: (answer: T) => void;
  onCancel: () => void;
}

const codeRefusals = ['CODE_NEEDED', 'CODE_USED', 'WRONG_CODE'];

/** Asks for the password again, and sends it along with what is to be done. */
export function AskPassword<T>(props: AskPasswordProps<T>) {
  const { email, path, action, withCode, isDanger, onAnswer, onCancel } = props;
  const [problem, setProblem] = useState<string | null>(null);
  const { control, handleSubmit, formState, setError } = useForm({
    defaultValues: { password: '', code: '' },
  });

  async function send({ password, code }: { password: string; code: string }) {
    setProblem(null);
    const body = withCode ? { password, code } : { password };
    const answer = await askAuth(() => authClient.$fetch<T>(path, { method: 'POST', body }));
    if (answer.refusal?.code === 'INVALID_PASSWORD' && answer.problem)
      setError('password', { message: answer.problem }, { shouldFocus: true });
    else if (answer.problem && codeRefusals.includes(answer.refusal?.code ?? ''))
      setError('code', { message: answer.problem }, { shouldFocus: true });
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
      {withCode ? (
        <Controlled control={control} name="code" rules={{ required: 'Write a code.' }}>
          {(field) => (
            <CodeField
              label="Code of your authenticator, or a recovery code"
              help="It proves that the second factor is yours to change."
              inputMode="text"
              maxLength={60}
              {...field}
            />
          )}
        </Controlled>
      ) : null}
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
