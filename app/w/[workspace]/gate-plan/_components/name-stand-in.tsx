'use client';

import { lazy, Suspense, useState } from 'react';
import { Button } from '@/app/_components/button';

const StandInDialog = lazy(async () => ({ default: (await import('./stand-in-dialog')).StandInDialog }));

export interface NameStandInProps {
  /** Of the stand-ins. */
  apiPath: string;
  /** The day that it is in the workspace. */
  today: string;
  role: string;
  /** People of the reader's role. */
  choices: readonly { id: string; name: string }[];
}

/** Says that the reader will be away, and who signs for them. The dialog is loaded when it is asked for. */
export function NameStandIn(props: NameStandInProps) {
  const [isOpen, setOpen] = useState(false);
  const [asked, setAsked] = useState(false);
  return (
    <>
      <Button
        onPress={() => {
          setAsked(true);
          setOpen(true);
        }}
      >
        I will be away
      </Button>
      {asked ? (
        <Suspense>
          <StandInDialog {...props} isOpen={isOpen} onOpenChange={setOpen} />
        </Suspense>
      ) : null}
    </>
  );
}
