'use client';

import {
  layerMapScale,
  sheetMapScale,
  trapMapScale,
  wallMapScale,
  type StageLimits,
} from '@/lib/stage-model/map-scale';
import type { SheetModelMeta } from '@/lib/stage-model/sheet-model-meta';
import type { StageMaps } from '@/lib/stage-model/stage-model-meta';
import { convertLength, formatLength, formatNumber } from '../format-figure';
import type { Units } from '../preferences';
import { usePreferences } from '../preferences-context';
import { LegendWords } from './legend-words';
import {
  layerWords,
  SHEET_DIGITS,
  sheetWords,
  STEP_DIGITS,
  trapWords,
  wallWords,
  WALL_DIGITS,
  type MapWords,
} from './map-words';
import { ScaleLegend } from './scale-legend';

/** The step that layers leave on each slope, for the recipe's layer. */
export function LayerLegend(props: {
  maps: StageMaps | undefined;
  limits: StageLimits;
  layerMm: number;
  reading: number | null;
}) {
  const { maps, limits, layerMm, reading } = props;
  const { units } = usePreferences();
  const scale = layerMapScale(layerMm, limits);
  const words = layerWords(maps, { ...limits, layerMm }, units);
  const histogram = maps && {
    ...maps.layers.histogram,
    edges: maps.layers.histogram.edges.map((share) => share * layerMm),
  };
  return (
    <ScaleLegend
      title="Layer lines"
      caption={`step in ${units}, layers of ${formatLength(layerMm, units, WALL_DIGITS)}`}
      scale={scale}
      histogram={histogram ?? null}
      reading={reading}
      format={ticksIn(units, STEP_DIGITS)}
      description={describe('the step that layers leave', scale, units, STEP_DIGITS, words)}
    >
      <LegendWords {...words} />
    </ScaleLegend>
  );
}

/** Thickness of the part behind each face. */
export function WallLegend(props: {
  wall: NonNullable<StageMaps['wall']>;
  limits: StageLimits;
  reading: number | null;
}) {
  const { wall, limits, reading } = props;
  const { units } = usePreferences();
  const scale = wallMapScale(limits);
  const words = wallWords(wall, limits, units);
  return (
    <ScaleLegend
      title="Wall thickness"
      caption={`${units}, by area`}
      scale={scale}
      histogram={wall.range ? wall.histogram : null}
      reading={reading}
      format={ticksIn(units, 1)}
      description={describe('wall thickness', scale, units, WALL_DIGITS, words)}
    >
      <LegendWords {...words} />
    </ScaleLegend>
  );
}

/** Thickness of the sheet once it is formed over the template. */
export function SheetLegend(props: { sheet: SheetModelMeta; limits: StageLimits; reading: number | null }) {
  const { sheet, limits, reading } = props;
  const { units } = usePreferences();
  const scale = sheetMapScale(sheet.gaugeMm, limits);
  const words = sheetWords(sheet, limits, units);
  return (
    <ScaleLegend
      title="Formed sheet"
      caption={`thickness in ${units}, by area`}
      scale={scale}
      histogram={sheet.rangeMm ? sheet.histogram : null}
      reading={reading}
      format={ticksIn(units, SHEET_DIGITS)}
      description={describe('the formed sheet’s thickness', scale, units, SHEET_DIGITS, words)}
    >
      <LegendWords {...words} />
    </ScaleLegend>
  );
}

/** How deep each face lies in a pocket that the sheet closes, and whether a vent leads out of it. */
export function TrapLegend(props: { maps: StageMaps; reading: number | null }) {
  const { maps, reading } = props;
  const trap = maps.trap!;
  const { units } = usePreferences();
  const words = trapWords(trap, units);
  if (!trap.range) {
    return (
      <figure className="w-full max-w-80 bg-sheet/85">
        <figcaption className="text-xs font-semibold">Trapped air</figcaption>
        <p className="mt-1 text-xs text-slate">{words.area}</p>
      </figure>
    );
  }
  const scale = trapMapScale(maps);
  return (
    <ScaleLegend
      title="Trapped air"
      caption={`${units} below the rim, by area`}
      scale={scale}
      histogram={trap.histogram}
      reading={reading}
      format={ticksIn(units, 1)}
      description={describe('depth below the rim that a pocket fills to', scale, units, 1, words)}
      hatchAll={words.broken}
    >
      <LegendWords {...words} />
    </ScaleLegend>
  );
}

/** A figure on the scale without its unit and without idle noughts. */
function ticksIn(units: Units, digits: number): (mm: number) => string {
  return (mm) => {
    const { value, digits: shown } = convertLength(mm, units, digits);
    return formatNumber(Number(value.toFixed(shown)), 6).replace(/\.?0+$/, '') || '0';
  };
}

function describe(
  what: string,
  { max, limit }: { max: number; limit: number | null },
  units: Units,
  digits: number,
  { area, range }: MapWords,
): string {
  const say = (mm: number) => formatLength(mm, units, digits);
  const mark = limit === null ? '' : ` Limit ${say(limit)}.`;
  return `Scale of ${what} from 0 to ${say(max)}.${mark} ${area}${/[.]$/.test(area) ? '' : '.'} ${range}`.trim();
}
