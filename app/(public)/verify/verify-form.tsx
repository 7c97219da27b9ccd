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

export function VerifyForm() {
  const [problem, setProblem] = useState<string | null>(null);
  const [sentTo, setSentTo] = useState<string | null>(null);
  const { control, handleSubmit, formState } = useForm({ defaultValues: { email: '' } });

  async function send({ email }: { email: string }) {
    setProblem(null);
    const address = email.trim();
    const answer = await askAuth(() =>
      authClient.sendVerificationEmail({ email: address, callbackURL: '/verify' }),
    );
    if (answer.problem) setProblem(answer.problem);
    else setSentTo(address);
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(send)} className="flex flex-col gap-4">
      <Controlled control={control} name="email" rules={emailRules}>
        {(field) => (
          <TextField label="E-mail" type="email" autoComplete="email" spellCheck="false" {...field} />
        )}
      </Controlled>
      <FormProblem>{problem}</FormProblem>
      <div role="status" className="empty:hidden">
        {sentTo ? (
          <p>
            If <strong>{sentTo}</strong> waits to be confirmed, a new link is on its way to it.
          </p>
        ) : null}
      </div>
      <div className="flex flex-wrap items-center justify-between gap-3">
        <Link href="/sign-in">Sign in</Link>
        <Button type="submit" isPending={formState.isSubmitting}>
          Send another link
        </Button>
      </div>
    </form>
  );
}
