'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { authClient } from '../../_components/auth-client';
import { Button } from '../../_components/button';
import { Controlled } from '../../_components/controlled';
import { askAuth } from '../../_components/explain-auth';
import { FormProblem } from '../../_components/form-problem';
import { Link } from '../../_components/link';
import { PasswordField } from '../../_components/password-field';
import { newPasswordHelp, newPasswordRules } from '../../_components/new-password-rules';

export function ResetForm({ token }: { token: string }) {
  const router = useRouter();
  const [problem, setProblem] = useState<string | null>(null);
  const { control, handleSubmit, formState } = useForm({ defaultValues: { password: '' } });

  async function reset({ password }: { password: string }) {
    setProblem(null);
    const answer = await askAuth(() => authClient.resetPassword({ newPassword: password, token }));
    if (answer.problem) {
      setProblem(answer.problem);
      return;
    }
    router.replace('/sign-in?password=set');
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(reset)} className="flex flex-col gap-4">
      <Controlled control={control} name="password" rules={newPasswordRules}>
        {(field) => (
          <PasswordField label="New password" help={newPasswordHelp} autoComplete="new-password" {...field} />
        )}
      </Controlled>
      <FormProblem>{problem}</FormProblem>
      <div className="flex flex-wrap items-center justify-between gap-3">
        <Link href="/forgot">Ask for a new link</Link>
        <Button type="submit" variant="primary" isPending={formState.isSubmitting}>
          Set the password
        </Button>
      </div>
    </form>
  );
}
