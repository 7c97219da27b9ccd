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
import { usePreferences } from '../../_components/preferences-context';
import { TextField } from '../../_components/text-field';
import { emailRules } from '../_components/email-rules';

interface Values {
  email: string;
  password: string;
}

/** `next` has been through `safePath`. */
export function SignInForm({ next, email }: { next: string; email: string }) {
  const router = useRouter();
  const { setUnits } = usePreferences();
  const [problem, setProblem] = useState<string | null>(null);
  const { control, handleSubmit, formState, setFocus } = useForm<Values>({
    defaultValues: { email, password: '' },
  });

  async function signIn({ email, password }: Values) {
    setProblem(null);
    const answer = await askAuth(() => authClient.signIn.email({ email: email.trim(), password }));
    if (answer.problem) {
      setProblem(answer.problem);
      setFocus('password');
      return;
    }
    // The right password of who has a second factor: a code is asked for on the next page.
    if (answer.data && 'twoFactorRedirect' in answer.data) {
      router.push(`/sign-in/code?next=${encodeURIComponent(next)}`);
      return;
    }
    const units = (answer.data?.user as { units?: unknown } | undefined)?.units;
    if (units === 'mm' || units === 'in') setUnits(units);
    router.replace(next);
    router.refresh();
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(signIn)} className="flex flex-col gap-4">
      <Controlled control={control} name="email" rules={emailRules}>
        {(field) => (
          <TextField label="E-mail" type="email" autoComplete="username" spellCheck="false" {...field} />
        )}
      </Controlled>
      <Controlled control={control} name="password" rules={{ required: 'Write your password.' }}>
        {(field) => <PasswordField label="Password" autoComplete="current-password" {...field} />}
      </Controlled>
      <FormProblem>{problem}</FormProblem>
      <div className="flex flex-wrap items-center justify-between gap-3">
        <Link href="/forgot">Set a new password</Link>
        <Button type="submit" variant="primary" isPending={formState.isSubmitting}>
          Sign in
        </Button>
      </div>
      <p className="border-t border-rule pt-4 text-sm text-slate">
        To open a studio of your own, <Link href="/sign-up">make an account</Link>. Invited? The link in the
        mail makes yours.
      </p>
    </form>
  );
}
