'use client';

import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { authClient } from '../../../_components/auth-client';
import { Button } from '../../../_components/button';
import { CodeField, sixDigits } from '../../../_components/code-field';
import { Controlled } from '../../../_components/controlled';
import { CopyButton } from '../../../_components/copy-button';
import { askAuth } from '../../../_components/explain-auth';
import { FormProblem } from '../../../_components/form-problem';
import { notify } from '../../../_components/notices';
import { AskPassword } from './ask-password';
import { QrCode } from './qr-code';
import { RecoveryCodes } from './recovery-codes';

type Enabled = { totpURI: string; backupCodes: string[] };

/** Password, then the secret for an authenticator and a code back from it, then the recovery codes. */
export default function SetUpSecondFactor({ email, onDone }: { email: string; onDone: () => void }) {
  const [made, setMade] = useState<Enabled | null>(null);
  const [isOn, setIsOn] = useState(false);
  if (!made)
    return (
      <AskPassword<Enabled>
        email={email}
        path="/two-factor/enable"
        action="Go on"
        onAnswer={setMade}
        onCancel={onDone}
      />
    );
  if (isOn) return <RecoveryCodes codes={made.backupCodes} onKept={onDone} />;
  return <BringCode uri={made.totpURI} onOn={() => setIsOn(true)} onCancel={onDone} />;
}

function BringCode({ uri, onOn, onCancel }: { uri: string; onOn: () => void; onCancel: () => void }) {
  const queries = useQueryClient();
  const [problem, setProblem] = useState<string | null>(null);
  const { control, handleSubmit, formState, reset, setFocus } = useForm({ defaultValues: { code: '' } });
  const secret = new URL(uri).searchParams.get('secret') ?? '';

  async function turnOn({ code }: { code: string }) {
    setProblem(null);
    const answer = await askAuth(() =>
      authClient.$fetch('/two-factor/verify-totp', { method: 'POST', body: { code } }),
    );
    if (answer.problem) {
      setProblem(answer.problem);
      reset();
      setFocus('code');
      return;
    }
    notify('Your second factor is on. Your other sessions have ended.');
    onOn();
    await queries.invalidateQueries({ queryKey: ['sessions'] });
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(turnOn)} className="flex w-full flex-col gap-4">
      <p>Let your authenticator read this, or type the secret into it. Neither is shown again later.</p>
      <div className="flex flex-wrap items-start gap-x-6 gap-y-4">
        <QrCode text={uri} label="The secret for your authenticator, as a QR code" />
        <div
          role="group"
          aria-label="Secret"
          className="flex min-w-0 flex-1 basis-56 flex-col items-start gap-2"
        >
          <p className="text-sm font-semibold">Secret</p>
          <p className="font-mono tabular break-words">{secret.match(/.{1,4}/g)?.join(' ')}</p>
          <CopyButton text={secret} what="the secret" />
          <p className="text-sm text-slate">Time based, six digits, 30 seconds.</p>
        </div>
      </div>
      <Controlled control={control} name="code" rules={{ validate: sixDigits }}>
        {(field) => <CodeField help="The one that it shows now." {...field} />}
      </Controlled>
      <FormProblem>{problem}</FormProblem>
      <div className="flex flex-wrap gap-3">
        <Button onPress={onCancel} isDisabled={formState.isSubmitting}>
          Leave it
        </Button>
        <Button type="submit" variant="primary" isPending={formState.isSubmitting}>
          Turn it on
        </Button>
      </div>
    </form>
  );
}
