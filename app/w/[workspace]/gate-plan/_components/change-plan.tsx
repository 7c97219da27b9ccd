'use client';

import { lazy, Suspense, useState, type ReactNode } from 'react';
import { Button } from '@/app/_components/button';
import type { PlanEditorProps } from './plan-editor';

const PlanEditor = lazy(async () => ({ default: (await import('./plan-editor')).PlanEditor }));

type Props = Omit<PlanEditorProps, 'onDone' | 'startedFrom'> & {
  /** The plan as it is read. */
  children: ReactNode;
};

/** The plan, and for a lead the way to change it; the editor is loaded when it is asked for. */
export function ChangePlan({ children, plan, ...rest }: Props) {
  const [startedFrom, setStartedFrom] = useState<PlanEditorProps['plan'] | null>(null);
  if (startedFrom)
    return (
      <Suspense fallback={children}>
        <PlanEditor {...rest} plan={plan} startedFrom={startedFrom} onDone={() => setStartedFrom(null)} />
      </Suspense>
    );
  return (
    <>
      {children}
      <Button className="mt-4" onPress={() => setStartedFrom(plan)}>
        Change the plan
      </Button>
    </>
  );
}
