'use client';

import type { Ref } from 'react';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';
import { DraftLegend } from './draft-legend';
import type { StageMap } from './stage-props';
import { UndercutLegend } from './undercut-legend';

/** The words at the foot of the stage: the reading or what to do, and the legend of the map. */
export function StageFoot(props: {
  ref: Ref<HTMLDivElement>;
  map: StageMap;
  meta: StageModelMeta;
  limitDeg: number;
  reading: string | null;
  draftDeg: number | null;
  hint: 'loading' | 'placing' | 'pins' | 'free';
}) {
  const { ref, map, meta, limitDeg, reading, draftDeg, hint } = props;
  return (
    <div
      ref={ref}
      className="relative z-10 flex flex-wrap items-end justify-between gap-x-6 gap-y-2 px-3 pt-1 pb-2.5 sm:pointer-events-none sm:absolute sm:inset-x-0 sm:bottom-0 sm:px-4"
    >
      <p className="min-h-9 max-w-md flex-1 basis-52 text-xs text-slate sm:min-h-0">
        {reading ? <span className="bg-sheet/80 font-mono text-ink">{reading}</span> : <Hint hint={hint} />}
      </p>
      {map === 'draft' ? <DraftLegend meta={meta} limitDeg={limitDeg} reading={draftDeg} /> : null}
      {map === 'undercut' ? <UndercutLegend meta={meta} /> : null}
    </div>
  );
}

function Hint({ hint }: { hint: 'loading' | 'placing' | 'pins' | 'free' }) {
  if (hint === 'loading') return 'The model is on its way.';
  if (hint === 'placing') {
    return (
      <>
        <span className="pointer-coarse:hidden">
          Press on the model to pin the note there, or bring the place under the cross-hair and press Enter.
        </span>
        <span className="hidden pointer-coarse:inline">Tap the model where the note belongs.</span>
      </>
    );
  }
  return (
    <>
      <span className="pointer-coarse:hidden">
        Drag to turn, or arrow keys.{hint === 'pins' ? ' N goes to the next item.' : ''}
      </span>
      <span className="hidden pointer-coarse:inline">Drag across to turn; two fingers move and zoom.</span>
    </>
  );
}
