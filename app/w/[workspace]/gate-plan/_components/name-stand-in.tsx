'use client';

import dynamic from 'next/dynamic';
import { useState } from 'react';
import { Button } from '@/app/_components/button';

const StandInDialog = dynamic(() => import('./stand-in-dialog').then((part) => part.StandInDialog), {
  ssr: false,
});

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
      {asked ? <StandInDialog {...props} isOpen={isOpen} onOpenChange={setOpen} /> : null}
    </>
  );
}
