'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { authClient } from '../../../_components/auth-client';
import { Button } from '../../../_components/button';
import { CodeField, sixDigits } from '../../../_components/code-field';
import { Controlled } from '../../../_components/controlled';
import { askAuth } from '../../../_components/explain-auth';
import { FormProblem } from '../../../_components/form-problem';
import { Link } from '../../../_components/link';
import { usePreferences } from '../../../_components/preferences-context';
import { TextField } from '../../../_components/text-field';

type Answer = { user: { units?: unknown } };

/** `next` has been through `safePath`. */
export function CodeForm({ next }: { next: string }) {
  const router = useRouter();
  const { setUnits } = usePreferences();
  const [problem, setProblem] = useState<string | null>(null);
  const [recovering, setRecovering] = useState(false);
  const { control, handleSubmit, formState, reset, setFocus } = useForm({ defaultValues: { code: '' } });
  const again = `/sign-in?next=${encodeURIComponent(next)}`;

  async function prove({ code }: { code: string }) {
    setProblem(null);
    const path = recovering ? '/two-factor/verify-backup-code' : '/two-factor/verify-totp';
    const answer = await askAuth(() => authClient.$fetch<Answer>(path, { method: 'POST', body: { code } }));
    if (answer.problem) {
      setProblem(answer.problem);
      reset();
      setFocus('code');
      return;
    }
    const units = answer.data?.user.units;
    if (units === 'mm' || units === 'in') setUnits(units);
    router.replace(next);
    router.refresh();
  }

  function turn() {
    setProblem(null);
    reset();
    setRecovering(!recovering);
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(prove)} className="flex flex-col gap-4">
      <Controlled
        key={recovering ? 'recovery' : 'code'}
        control={control}
        name="code"
        rules={recovering ? { required: 'Write one of your recovery codes.' } : { validate: sixDigits }}
      >
        {(field) =>
          recovering ? (
            <TextField
              label="Recovery code"
              help="Each works once. Case, blanks and hyphens do not matter."
              autoComplete="off"
              spellCheck="false"
              maxLength={60}
              mono
              {...field}
            />
          ) : (
            <CodeField help="It changes every half minute, and each works once." autoFocus {...field} />
          )
        }
      </Controlled>
      <FormProblem>{problem}</FormProblem>
      <div className="flex flex-wrap items-center justify-between gap-3">
        <Link href={again}>Back to the password</Link>
        <Button type="submit" variant="primary" isPending={formState.isSubmitting}>
          Sign in
        </Button>
      </div>
      <div className="border-t border-rule pt-4">
        <Button size="small" onPress={turn}>
          {recovering ? 'Use the authenticator' : 'Use a recovery code'}
        </Button>
        <p className="mt-2 text-sm text-slate">
          Neither at hand? Then this account stays closed: ask a lead of the studio to invite another address
          of yours.
        </p>
      </div>
    </form>
  );
}
