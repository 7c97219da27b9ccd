'use client';

import dynamic from 'next/dynamic';
import { useState, type ReactNode } from 'react';
import { Button } from '@/app/_components/button';
import { Skeleton } from '@/app/_components/skeleton';
import type { PlanEditorProps } from './plan-editor';

const PlanEditor = dynamic(() => import('./plan-editor').then((part) => part.PlanEditor), {
  ssr: false,
  loading: () => <Skeleton lines={8} label="The editor is on its way" />,
});

type Props = Omit<PlanEditorProps, 'onDone' | 'startedFrom'> & {
  /** The plan as it is read. */
  children: ReactNode;
};

/** The plan, and for a lead the way to change it; the editor is loaded when it is asked for. */
export function ChangePlan({ children, plan, ...rest }: Props) {
  const [startedFrom, setStartedFrom] = useState<PlanEditorProps['plan'] | null>(null);
  if (startedFrom)
    return <PlanEditor {...rest} plan={plan} startedFrom={startedFrom} onDone={() => setStartedFrom(null)} />;
  return (
    <>
      {children}
      <Button className="mt-4" onPress={() => setStartedFrom(plan)}>
        Change the plan
      </Button>
    </>
  );
}
