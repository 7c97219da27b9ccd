'use client';

import { Button } from '@/app/_components/button';
import type { SaveState } from '../_hooks/use-draft';

type Props = { state: SaveState; onTheirs: () => void; onMine: () => void };

/** Whether the draft is saved; after a change by somebody else, asks whose is to stay. */
export function SaveLine({ state, onTheirs, onMine }: Props) {
  if (state.kind === 'trouble' && state.stale)
    return (
      <div role="status" className="flex flex-col gap-2 text-sm text-madder">
        <p>
          Somebody else changed this draft, so yours is not saved. Taking theirs drops what you changed here
          since the last save; keeping yours overwrites theirs.
        </p>
        <div className="flex flex-wrap gap-2">
          <Button size="small" onPress={onTheirs}>
            Take theirs
          </Button>
          <Button size="small" onPress={onMine}>
            Keep mine
          </Button>
        </div>
      </div>
    );
  if (state.kind === 'trouble')
    return (
      <p role="status" className="text-sm text-madder">
        {state.detail}
      </p>
    );
  return (
    <p role="status" className="text-sm text-slate">
      {state.kind === 'saving'
        ? 'Saving the draft …'
        : state.at
          ? 'The draft is saved.'
          : 'Changes are saved as you make them.'}
    </p>
  );
}
