'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { api, explainError } from '@/app/_components/api-client';
import { Button } from '@/app/_components/button';
import { notify } from '@/app/_components/notices';

/** Ends a stand-in; what was signed meanwhile stays. */
export function EndStandIn({ apiPath, label }: { apiPath: string; label: string }) {
  const router = useRouter();
  const [busy, setBusy] = useState(false);

  async function end() {
    setBusy(true);
    try {
      await api(apiPath, { method: 'DELETE' });
      notify('It was ended. What was signed meanwhile stays.');
    } catch (error) {
      notify(explainError(error).detail, { kind: 'trouble' });
    } finally {
      setBusy(false);
      router.refresh();
    }
  }

  return (
    <Button size="small" isPending={busy} onPress={() => void end()} aria-label={label}>
      End
    </Button>
  );
}
