import { draftScaleMaxDeg } from './draft-scale';
import type { StageMaps } from './stage-model-meta';

/** What the maps are held against; null where there is no such limit. Lengths in mm. */
export interface StageLimits {
  /** least draft of a wall, degrees */
  draftDeg: number;
  /** height of a printed layer; null where the recipe names none */
  layerMm: number | null;
  /** greatest step that a layer may leave; null where it does not matter, as on a sanded template */
  stepMm: number | null;
  /** least wall */
  wallMm: number | null;
  /** least thickness wanted of the formed sheet */
  sheetMm: number | null;
}

/** How a figure becomes a place on the colour scale. The dark end is always the one to look at. */
export interface MapScale {
  /** the scale runs from 0 to here; what lies beyond takes the last colour */
  max: number;
  limit: number | null;
  /** side of the limit on which it is broken, and which is dark */
  dark: 'low' | 'high';
  /** figures differ by this from one iso-line to the next */
  isoStep: number;
  /** no figure lies beyond the scale's end */
  closed?: boolean;
}

/** Place in the colour table from which on hatching is dark, as light strokes would not show. */
export const STROKES_TURN = 0.62;

export function draftMapScale({ draftDeg }: Pick<StageLimits, 'draftDeg'>): MapScale {
  return { max: draftScaleMaxDeg(draftDeg), limit: draftDeg, dark: 'low', isoStep: 5 };
}

/** No step is higher than its layer; a limit beyond that stays on the scale, so that it can be seen not to be reached. */
export function layerMapScale(layerMm: number, { stepMm }: StageLimits): MapScale {
  const max = Math.max(layerMm, (stepMm ?? 0) * 1.25);
  return { max, limit: stepMm, dark: 'high', isoStep: max / 5 };
}

/** Three limits long, 6 mm at least: what is thicker is thick enough to look alike. */
export function wallMapScale({ wallMm }: StageLimits): MapScale {
  return { max: Math.max(6, Math.ceil((wallMm ?? 0) * 3)), limit: wallMm, dark: 'low', isoStep: 1 };
}

/** As thick as the sheet was before forming, or as the limit, so that both can be seen. */
export function sheetMapScale(gaugeMm: number, { sheetMm }: Pick<StageLimits, 'sheetMm'>): MapScale {
  const max = Math.max(gaugeMm, (sheetMm ?? 0) * 1.25);
  return { max, limit: sheetMm || null, dark: 'low', isoStep: roundUp(max) / 5, closed: true };
}

/** As deep as the deepest pocket, rounded up to a plain figure. */
export function trapMapScale({ trap }: StageMaps): MapScale {
  const max = roundUp(trap?.range?.[1] ?? 1);
  return { max, limit: null, dark: 'high', isoStep: max / 5 };
}

/** Place of a figure on the scale, 0..1; beyond its ends it stays at the ends. */
export function placeOnScale(figure: number, { max }: MapScale): number {
  return Math.min(1, Math.max(0, figure / max));
}

/** Place in the colour table, 0 dark … 1 light. */
export function colourAt(figure: number, scale: MapScale): number {
  const at = placeOnScale(figure, scale);
  return scale.dark === 'high' ? 1 - at : at;
}

const PLAIN = [1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10];

/** The next of 1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8 and their tenfolds; 0.1 at least. */
export function roundUp(figure: number): number {
  const size = 10 ** Math.floor(Math.log10(Math.max(0.1, figure)) + 1e-9);
  const plain = PLAIN.find((step) => step * size >= figure - 1e-6 * size) ?? 10;
  return Number((plain * size).toPrecision(6));
}
