'use client';

import type { Ref } from 'react';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';
import { DraftLegend } from './draft-legend';
import type { StageLimits } from '@/lib/stage-model/map-scale';
import type { SheetModelMeta } from '@/lib/stage-model/sheet-model-meta';
import { LayerLegend, SheetLegend, TrapLegend, WallLegend } from './length-legends';
import type { StageMap } from './stage-maps';
import { UndercutLegend } from './undercut-legend';

/** The words at the foot of the stage: the reading or what to do, and the legend of the map. */
export function StageFoot(props: {
  ref: Ref<HTMLDivElement>;
  map: StageMap;
  meta: StageModelMeta;
  sheet: SheetModelMeta | null;
  limits: StageLimits;
  /** the place under the pointer in words, and its figure on the map's scale */
  reading: string | null;
  figure: number | null;
  hint: 'loading' | 'placing' | 'pins' | 'free';
}) {
  const { ref, reading, hint, ...legend } = props;
  return (
    <div
      ref={ref}
      className="relative z-10 flex flex-wrap items-end justify-between gap-x-6 gap-y-2 px-3 pt-1 pb-2.5 sm:pointer-events-none sm:absolute sm:inset-x-0 sm:bottom-0 sm:px-4"
    >
      <p className="min-h-9 max-w-md flex-1 basis-52 text-xs text-slate sm:min-h-0">
        {reading ? <span className="bg-sheet/80 font-mono text-ink">{reading}</span> : <Hint hint={hint} />}
      </p>
      <Legend {...legend} />
    </div>
  );
}

function Legend(props: {
  map: StageMap;
  meta: StageModelMeta;
  sheet: SheetModelMeta | null;
  limits: StageLimits;
  figure: number | null;
}) {
  const { map, meta, sheet, limits, figure } = props;
  const { maps } = meta;
  if (map === 'draft') return <DraftLegend meta={meta} limitDeg={limits.draftDeg} reading={figure} />;
  if (map === 'undercut') return <UndercutLegend meta={meta} />;
  if (map === 'layers' && limits.layerMm !== null)
    return <LayerLegend maps={maps} limits={limits} layerMm={limits.layerMm} reading={figure} />;
  if (map === 'wall' && maps?.wall) return <WallLegend wall={maps.wall} limits={limits} reading={figure} />;
  if (map === 'sheet' && sheet) return <SheetLegend sheet={sheet} limits={limits} reading={figure} />;
  if (map === 'trap' && maps?.trap) return <TrapLegend maps={maps} reading={figure} />;
  return null;
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
