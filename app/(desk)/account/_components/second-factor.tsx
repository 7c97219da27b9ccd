'use client';

import { useRouter } from 'next/navigation';
import { lazy, Suspense, useState } from 'react';
import { Button } from '../../../_components/button';
import { Skeleton } from '../../../_components/skeleton';
import { StatusWord } from '../../../_components/status-word';

const SetUpSecondFactor = lazy(() => import('./set-up-second-factor'));
const ChangeSecondFactor = lazy(() => import('./change-second-factor'));

type Doing = 'set-up' | 'new-codes' | 'turn-off';

/** Whether the second factor is on, and the way to turn it on or off; the forms come when they are asked for. */
export function SecondFactor({ email, on, codesLeft }: { email: string; on: boolean; codesLeft: number }) {
  const router = useRouter();
  const [doing, setDoing] = useState<Doing | null>(null);
  const done = () => {
    setDoing(null);
    router.refresh();
  };
  return (
    <div className="flex flex-col items-start gap-4">
      {/* Between off and on while it is set up. */}
      <div className={doing === 'set-up' ? 'hidden' : undefined}>
        <p>
          <StatusWord state={on ? 'done' : 'ahead'} word={on ? 'on' : 'off'} />
        </p>
        <p className="mt-1">
          {on
            ? `Signing in, and signing a gate, asks for a code besides the password. ${codesLeft === 1 ? 'One recovery code is' : `${codesLeft} recovery codes are`} left.`
            : 'The password alone signs you in. An authenticator on your telephone or computer makes codes that nobody else has.'}
        </p>
      </div>
      {doing === null ? (
        <div className="flex flex-wrap gap-3">
          {on ? (
            <>
              <Button onPress={() => setDoing('new-codes')}>Make new recovery codes</Button>
              <Button variant="danger" onPress={() => setDoing('turn-off')}>
                Turn it off
              </Button>
            </>
          ) : (
            <Button onPress={() => setDoing('set-up')}>Set it up</Button>
          )}
        </div>
      ) : (
        <Suspense fallback={<Skeleton lines={3} label="One moment" />}>
          {doing === 'set-up' ? (
            <SetUpSecondFactor email={email} onDone={done} />
          ) : (
            <ChangeSecondFactor email={email} what={doing} onDone={done} />
          )}
        </Suspense>
      )}
    </div>
  );
}
