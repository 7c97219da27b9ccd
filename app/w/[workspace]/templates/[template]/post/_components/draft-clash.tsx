'use client';

import { useEffect, useRef } from 'react';
import { Button } from '@/app/_components/button';
import { ButtonLink } from '@/app/_components/link';
import type { SaveState } from '../_hooks/use-draft';

type Props = {
  state: SaveState;
  /** Whose page this is: a change of their own came from another tab. */
  readerId: string;
  templatePath: string;
  onTheirs: () => void;
  onMine: () => void;
};

/** Over the form, when it can no longer be saved as it is: what happened to the draft, and the ways on. */
export function DraftClash({ state, readerId, templatePath, onTheirs, onMine }: Props) {
  const clash = state.kind === 'trouble' ? state.clash : null;
  const bar = useRef<HTMLDivElement>(null);
  const kind = clash?.kind;
  useEffect(() => {
    if (kind) bar.current?.scrollIntoView({ block: 'nearest' });
  }, [kind]);
  if (!clash) return null;
  const gone = clash.kind === 'gone';
  return (
    <div
      ref={bar}
      role="alert"
      className="sticky top-0 z-20 flex scroll-mt-4 flex-wrap items-center justify-between gap-x-6 gap-y-2 border border-l-4 border-madder bg-sheet px-4 py-3"
    >
      <div className="max-w-prose">
        <p className="font-semibold">
          {gone ? 'There is no draft any more' : `${whoChanged(clash, readerId)}`}
        </p>
        <p className="text-sm">
          {gone
            ? 'It was posted or discarded, in another tab of yours or by somebody else. What you changed here since is not saved. Keeping it begins the next draft with what stands in this form.'
            : 'What you changed here since is not saved. Taking the other one drops it; keeping yours overwrites the other.'}
        </p>
      </div>
      <div className="flex flex-wrap gap-2">
        {gone ? <ButtonLink href={templatePath}>Go to the template</ButtonLink> : null}
        <Button onPress={onMine}>Keep mine</Button>
        <Button onPress={onTheirs}>
          {gone ? 'Reload' : isReader(clash, readerId) ? 'Take the other tab’s' : 'Take theirs'}
        </Button>
      </div>
    </div>
  );
}

type Changed = { by: { id: string; name: string } | null };
const isReader = ({ by }: Changed, readerId: string) => by?.id === readerId;

function whoChanged(clash: Changed, readerId: string): string {
  if (isReader(clash, readerId)) return 'This draft was changed in another tab of yours';
  return `${clash.by?.name ?? 'Somebody'} changed this draft meanwhile`;
}
