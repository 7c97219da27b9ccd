'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { api, explainError } from '../api-client';
import { Button } from '../button';
import { notify } from '../notices';

/** Takes an open invitation back. */
export function CancelInvitation({ apiPath, email }: { apiPath: string; email: string }) {
  const router = useRouter();
  const [busy, setBusy] = useState(false);

  async function cancel() {
    setBusy(true);
    try {
      await api(apiPath, { method: 'DELETE' });
      notify(`The invitation of ${email} was taken back; its link no longer works.`);
    } catch (error) {
      notify(explainError(error).detail, { kind: 'trouble' });
    } finally {
      setBusy(false);
      router.refresh();
    }
  }

  return (
    <Button size="small" isPending={busy} onPress={() => void cancel()} aria-label={`Take back ${email}`}>
      Take back
    </Button>
  );
}
