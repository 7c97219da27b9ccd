import { areaAbove, areaBelow, totalArea } from '@/lib/stage-model/map-histogram';
import type { StageLimits } from '@/lib/stage-model/map-scale';
import type { SheetModelMeta } from '@/lib/stage-model/sheet-model-meta';
import type { StageMaps } from '@/lib/stage-model/stage-model-meta';
import { convertLength, formatLength, formatNumber } from '../format-figure';
import type { Units } from '../preferences';
import { formatArea, formatShare } from './format-area';

/** What a map says of the whole part: the area beyond the limit, and from where to where the figures run. */
export interface MapWords {
  area: string;
  range: string;
  broken: boolean;
}

/** Decimals that the maps' lengths are told with, in mm; inches carry one more. */
export const STEP_DIGITS = 3;
export const WALL_DIGITS = 2;
export const DEPTH_DIGITS = 1;
export const SHEET_DIGITS = 2;

/** Layer lines; `maps` is missing on models that were made before areas by layer line were counted. */
export function layerWords(
  maps: StageMaps | undefined,
  { layerMm, stepMm }: StageLimits & { layerMm: number },
  units: Units,
): MapWords {
  const say = (mm: number) => formatLength(mm, units, STEP_DIGITS);
  if (!maps) {
    const area = 'The area was not counted when this model was made; a new revision has it.';
    return { area, range: `Steps are no higher than the layer, ${say(layerMm)}.`, broken: false };
  }
  const { range, histogram } = maps.layers;
  if (!range) return { area: 'No face slopes: layers leave no steps.', range: '', broken: false };
  const steps = spanWords(
    'Steps',
    range.map((share) => share * layerMm) as [number, number],
    units,
    STEP_DIGITS,
  );
  const all = totalArea(histogram);
  if (stepMm === null)
    return {
      area: `${formatArea(all, units)} of sloping faces, sanded after printing`,
      range: steps,
      broken: false,
    };
  const above = areaAbove(histogram, Math.min(1, stepMm / layerMm));
  const area = `${formatArea(above, units)} of the sloping faces, ${formatShare(above, all)}, above ${say(stepMm)}`;
  return { area, range: steps, broken: above > 0 };
}

export function wallWords(
  wall: NonNullable<StageMaps['wall']>,
  { wallMm }: StageLimits,
  units: Units,
): MapWords {
  if (!wall.range) {
    const area = 'No wall to measure: no face has another one of the part behind it, nearly parallel.';
    return { area, range: '', broken: false };
  }
  const range = spanWords('Thickness', wall.range, units, WALL_DIGITS);
  const all = totalArea(wall.histogram);
  if (wallMm === null) return { area: `${formatArea(all, units)} measured`, range, broken: false };
  const below = areaBelow(wall.histogram, wallMm);
  const limit = formatLength(wallMm, units, WALL_DIGITS);
  const area = `${formatArea(below, units)} of the faces measured, ${formatShare(below, all)}, below ${limit}`;
  return { area, range, broken: below > 0 };
}

/** The formed part's own sheet; the foot along the bed, where it is trimmed, is told apart. */
export function sheetWords(
  { rangeMm, histogram, gaugeMm }: SheetModelMeta,
  { sheetMm }: Pick<StageLimits, 'sheetMm'>,
  units: Units,
): MapWords {
  const say = (mm: number) => formatLength(mm, units, SHEET_DIGITS);
  if (!rangeMm) return { area: 'The template stands no higher than its foot.', range: '', broken: false };
  const range = `${spanWords('Thickness', rangeMm, units, SHEET_DIGITS)} An estimate from ${say(gaugeMm)} of sheet; the foot along the bed is left out.`;
  const all = totalArea(histogram);
  if (!sheetMm) return { area: `${formatArea(all, units)} of the part`, range, broken: false };
  const below = areaBelow(histogram, sheetMm);
  if (below === 0)
    return {
      area: `None of the part’s ${formatArea(all, units)} below the ${say(sheetMm)} wanted`,
      range,
      broken: false,
    };
  const area = `${formatArea(below, units)} of the part, ${formatShare(below, all)}, below the ${say(sheetMm)} wanted`;
  return { area, range, broken: below > 0 };
}

export function trapWords(trap: NonNullable<StageMaps['trap']>, units: Units): MapWords {
  if (!trap.range) return { area: 'No pocket: the air runs off everywhere.', range: '', broken: false };
  const range = `Pockets reach ${formatLength(trap.range[1], units, DEPTH_DIGITS)} below the rim they fill to.`;
  const all = totalArea(trap.histogram);
  if (trap.unventedMm2 === 0)
    return { area: `${formatArea(all, units)} in pockets, all with a vent`, range, broken: false };
  const share = `${formatArea(trap.unventedMm2, units)} in pockets without a vent`;
  return { area: `${share}, ${formatShare(trap.unventedMm2, all)} of all pockets`, range, broken: true };
}

function spanWords(what: string, [low, high]: [number, number], units: Units, digits: number): string {
  const [from, to] = [low, high].map((mm) => convertLength(mm, units, digits));
  return `${what} from ${formatNumber(from.value, from.digits)} to ${formatNumber(to.value, to.digits)}\u00a0${to.unit}.`;
}
