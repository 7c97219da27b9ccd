'use client';

import { areaBelowDraft } from '@/lib/stage-model/draft-histogram';
import { FLAT_FROM_DEG } from '@/lib/stage-model/draft-scale';
import { draftMapScale } from '@/lib/stage-model/map-scale';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';
import { formatNumber } from '../format-figure';
import { usePreferences } from '../preferences-context';
import { formatArea, formatShare } from './format-area';
import { LegendWords } from './legend-words';
import { ScaleLegend } from './scale-legend';

/** Area of the walls and of what is below the limit, mm²; faces that look down count as below. */
export function wallAreas({ histogram }: StageModelMeta, limitDeg: number) {
  const walls = areaBelowDraft(histogram, FLAT_FROM_DEG);
  return { walls, below: areaBelowDraft(histogram, Math.min(limitDeg, FLAT_FROM_DEG)) };
}

/** The scale of the draft map with the area of the walls over it, the limit, and the place of a reading. */
export function DraftLegend(props: { meta: StageModelMeta; limitDeg: number; reading: number | null }) {
  const { meta, limitDeg, reading } = props;
  const { units } = usePreferences();
  const scale = draftMapScale({ draftDeg: limitDeg });
  const { walls, below } = wallAreas(meta, limitDeg);
  const limit = Number(limitDeg.toFixed(1));
  const area = `${formatArea(below, units)} of the walls, ${formatShare(below, walls)}, below ${limit}°`;
  const range = `Least ${formatNumber(meta.draftRangeDeg[0], 1)}°.`;
  return (
    <ScaleLegend
      title="Draft of the walls"
      caption="degrees, by area"
      scale={scale}
      histogram={{ edges: meta.histogram.edgesDeg, areaMm2: meta.histogram.areaMm2 }}
      reading={reading}
      format={(deg) => String(Number(deg.toFixed(1)))}
      description={`Scale from 0 to ${scale.max} degrees of draft. Limit ${limit} degrees: ${area}. ${range}`}
    >
      <LegendWords area={area} range={range} broken={below > 0} />
    </ScaleLegend>
  );
}
