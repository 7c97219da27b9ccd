'use client';

import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { notify } from '../../../_components/notices';
import { AskPassword } from './ask-password';
import { RecoveryCodes } from './recovery-codes';

interface ChangeProps {
  email: string;
  what: 'new-codes' | 'turn-off';
  onDone: () => void;
}

/** New recovery codes, or no second factor any more; both ask for the password and for a code. */
export default function ChangeSecondFactor({ email, what, onDone }: ChangeProps) {
  const queries = useQueryClient();
  const [codes, setCodes] = useState<string[] | null>(null);
  if (codes) return <RecoveryCodes codes={codes} onKept={onDone} />;
  if (what === 'new-codes')
    return (
      <AskPassword<{ backupCodes: string[] }>
        email={email}
        path="/two-factor/generate-backup-codes"
        action="Make new codes"
        withCode
        onAnswer={(answer) => setCodes(answer.backupCodes)}
        onCancel={onDone}
      />
    );
  return (
    <AskPassword
      email={email}
      path="/two-factor/disable"
      action="Turn it off"
      withCode
      isDanger
      onAnswer={() => {
        notify('Your second factor is off.');
        onDone();
        void queries.invalidateQueries({ queryKey: ['sessions'] });
      }}
      onCancel={onDone}
    />
  );
}
