'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { api, explainError } from './api-client';
import { Button } from './button';
import { notify } from './notices';

type Props = {
  apiPath: string;
  /** Says what it ends, for screen readers; the button itself says how. */
  label: string;
  /** The notice once it is done. */
  done: string;
  children: string;
};

/** Ends or takes back at one press what can be made again; the page is read anew, also where it was refused. */
export function DeleteButton({ apiPath, label, done, children }: Props) {
  const router = useRouter();
  const [busy, setBusy] = useState(false);

  async function run() {
    setBusy(true);
    try {
      await api(apiPath, { method: 'DELETE' });
      notify(done);
    } catch (error) {
      notify(explainError(error).detail, { kind: 'trouble' });
    } finally {
      setBusy(false);
      router.refresh();
    }
  }

  return (
    <Button size="small" isPending={busy} onPress={() => void run()} aria-label={label}>
      {children}
    </Button>
  );
}
