'use client';

import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { authClient } from '../../_components/auth-client';
import { Button } from '../../_components/button';
import { Controlled } from '../../_components/controlled';
import { askAuth } from '../../_components/explain-auth';
import { FormProblem } from '../../_components/form-problem';
import { Link } from '../../_components/link';
import { newPasswordHelp, newPasswordRules } from '../../_components/new-password-rules';
import { PasswordField } from '../../_components/password-field';
import { TextField } from '../../_components/text-field';
import { browserZone } from '../_components/browser-zone';
import { emailRules } from '../_components/email-rules';

interface Values {
  name: string;
  email: string;
  password: string;
}

/** Says the same for an address that has an account already: nobody learns who has one. */
export function SignUpForm() {
  const [problem, setProblem] = useState<string | null>(null);
  const [sentTo, setSentTo] = useState<string | null>(null);
  const { control, handleSubmit, formState } = useForm<Values>({
    defaultValues: { name: '', email: '', password: '' },
  });

  async function signUp({ name, email, password }: Values) {
    setProblem(null);
    const address = email.trim();
    const answer = await askAuth(() =>
      authClient.signUp.email({
        name: name.trim(),
        email: address,
        password,
        callbackURL: '/verify?next=/studio/new',
        timeZone: browserZone(),
      } as Parameters<typeof authClient.signUp.email>[0]),
    );
    if (answer.problem) setProblem(answer.problem);
    else setSentTo(address);
  }

  if (sentTo)
    return (
      <div role="status" className="flex flex-col gap-3">
        <p>
          A mail is on its way to <strong>{sentTo}</strong>. Open its link to confirm the address; it works
          for an hour.
        </p>
        <p className="text-sm text-slate">
          Nothing came? The address may have an account already:{' '}
          <Link href={`/sign-in?email=${encodeURIComponent(sentTo)}`}>sign in</Link>, or{' '}
          <Link href="/verify">ask for another link</Link>.
        </p>
      </div>
    );

  return (
    <form method="post" noValidate onSubmit={handleSubmit(signUp)} className="flex flex-col gap-4">
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
      <Controlled control={control} name="email" rules={emailRules}>
        {(field) => (
          <TextField label="E-mail" type="email" autoComplete="username" spellCheck="false" {...field} />
        )}
      </Controlled>
      <Controlled control={control} name="password" rules={newPasswordRules}>
        {(field) => (
          <PasswordField label="Password" help={newPasswordHelp} autoComplete="new-password" {...field} />
        )}
      </Controlled>
      <FormProblem>{problem}</FormProblem>
      <div className="flex flex-wrap items-center justify-between gap-3">
        <Link href="/sign-in">Sign in</Link>
        <Button type="submit" variant="primary" isPending={formState.isSubmitting}>
          Make account
        </Button>
      </div>
    </form>
  );
}
