'use client';

import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { newPasswordHelp, newPasswordRules } from '../../../_components/new-password-rules';
import { authClient } from '../../../_components/auth-client';
import { Button } from '../../../_components/button';
import { Controlled } from '../../../_components/controlled';
import { askAuth } from '../../../_components/explain-auth';
import { FormProblem } from '../../../_components/form-problem';
import { notify } from '../../../_components/notices';
import { PasswordField } from '../../../_components/password-field';

const empty = { current: '', next: '' };

export function PasswordForm({ email }: { email: string }) {
  const queries = useQueryClient();
  const [problem, setProblem] = useState<string | null>(null);
  const { control, handleSubmit, formState, reset, setError } = useForm({ defaultValues: empty });

  async function change(values: typeof empty) {
    setProblem(null);
    const answer = await askAuth(() =>
      authClient.changePassword({
        currentPassword: values.current,
        newPassword: values.next,
        revokeOtherSessions: true,
      }),
    );
    if (answer.refusal?.code === 'INVALID_PASSWORD' && answer.problem) {
      setError('current', { message: answer.problem }, { shouldFocus: true });
      return;
    }
    if (answer.problem) {
      setProblem(answer.problem);
      return;
    }
    reset(empty);
    notify('The new password is set. Your other sessions have ended.');
    await queries.invalidateQueries({ queryKey: ['sessions'] });
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(change)} className="flex flex-col gap-4">
      <input type="email" name="email" value={email} autoComplete="username" readOnly hidden />
      <Controlled control={control} name="current" rules={{ required: 'Write your current password.' }}>
        {(field) => <PasswordField label="Current password" autoComplete="current-password" {...field} />}
      </Controlled>
      <Controlled control={control} name="next" rules={newPasswordRules}>
        {(field) => (
          <PasswordField label="New password" help={newPasswordHelp} autoComplete="new-password" {...field} />
        )}
      </Controlled>
      <FormProblem>{problem}</FormProblem>
      <Button type="submit" className="self-start" isPending={formState.isSubmitting}>
        Set the new password
      </Button>
    </form>
  );
}
