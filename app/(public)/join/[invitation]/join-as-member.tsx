'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { explainError, newIdempotencyKey } from '../../../_components/api-client';
import { Button } from '../../../_components/button';
import { FormProblem } from '../../../_components/form-problem';
import { acceptInvitation } from './accept-invitation';

/** For a person who is signed in with the invited address. */
export function JoinAsMember({ token, name, place }: { token: string; name: string; place: string }) {
  const router = useRouter();
  const [key] = useState(newIdempotencyKey);
  const [isPending, setPending] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);

  async function join() {
    setPending(true);
    setProblem(null);
    try {
      router.replace(await acceptInvitation(token, key, null));
      router.refresh();
    } catch (error) {
      setProblem(explainError(error).detail);
      setPending(false);
    }
  }

  return (
    <div className="flex flex-col items-start gap-4">
      <p>You are signed in as {name}.</p>
      <FormProblem>{problem}</FormProblem>
      <Button variant="primary" size="roomy" isPending={isPending} onPress={join}>
        Join {place}
      </Button>
    </div>
  );
}
