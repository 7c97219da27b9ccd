'use client';

import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { authClient } from '../../_components/auth-client';
import { Button } from '../../_components/button';
import { Controlled } from '../../_components/controlled';
import { askAuth } from '../../_components/explain-auth';
import { FormProblem } from '../../_components/form-problem';
import { Link } from '../../_components/link';
import { TextField } from '../../_components/text-field';
import { emailRules } from '../_components/email-rules';

export function ForgotForm() {
  const [problem, setProblem] = useState<string | null>(null);
  const [sentTo, setSentTo] = useState<string | null>(null);
  const { control, handleSubmit, formState } = useForm({ defaultValues: { email: '' } });

  async function ask({ email }: { email: string }) {
    setProblem(null);
    const address = email.trim();
    const answer = await askAuth(() =>
      authClient.requestPasswordReset({ email: address, redirectTo: '/reset' }),
    );
    if (answer.problem) setProblem(answer.problem);
    else setSentTo(address);
  }

  return (
    <>
      <div role="status" className="empty:hidden">
        {sentTo ? (
          <p>
            If <strong>{sentTo}</strong> belongs to somebody here, a link is on its way to it. Look in the
            spam folder as well, then <Link href="/sign-in">sign in</Link> with the new password.
          </p>
        ) : null}
      </div>
      {sentTo ? null : (
        <form method="post" noValidate onSubmit={handleSubmit(ask)} className="flex flex-col gap-4">
          <Controlled control={control} name="email" rules={emailRules}>
            {(field) => (
              <TextField label="E-mail" type="email" autoComplete="username" spellCheck="false" {...field} />
            )}
          </Controlled>
          <FormProblem>{problem}</FormProblem>
          <div className="flex flex-wrap items-center justify-between gap-3">
            <Link href="/sign-in">Back to sign in</Link>
            <Button type="submit" variant="primary" isPending={formState.isSubmitting}>
              Mail me a link
            </Button>
          </div>
        </form>
      )}
    </>
  );
}
