import type { SheetReport } from '../report-sheet';
import { formSheet, type FormedSheet } from './form-sheet';
import type { SheetInput, SheetOptions } from './sheet-input';

/** What helps a sheet that comes out too thin: a thicker one, or a change of the template where it is thin. */
export type ThinRemedy = 'gauge' | 'radius' | 'gap' | 'height';

export interface GaugeRemedy {
  /** Least gauge, rounded up to the step, whose own run reached the thickness; null where none did. */
  gaugeMm: number | null;
  /** Gauge that scaling asks for, mm: beyond four times the present one, or 20 mm, it is not run, for no gauge mends that. */
  scaledMm: number;
  /** Least thickness of the part in the last run, mm. */
  minMm: number;
  runs: number;
  /** What would serve better than gauge where little of the sheet is thin. */
  better: ThinRemedy;
}

const MOST_RUNS = 4;
const MOST_FACTOR = 4;
/** The thickest sheet that a recipe takes, mm. */
const MOST_GAUGE_MM = 20;
/** Share of the formed area below the limit up to which the template is better changed than the whole sheet. */
const LOCAL_SHARE = 0.05;

/**
 * The gauge that gives the part a wanted least thickness: scaled (thickness goes with gauge while p/(μ t0) is held), then
 * verified by a run of its own, and scaled again while that falls short, as it may where a given load presses a
 * thicker sheet less far into corners.
 * @param formed the run at `input`'s own gauge
 * @param stepMm gauges go up in this step (0.05 mm: common practice, no source)
 */
export function gaugeFor(
  input: SheetInput,
  formed: FormedSheet,
  wantedMinMm: number,
  options: SheetOptions = {},
  stepMm = 0.05,
): GaugeRemedy {
  if (!(wantedMinMm > 0 && stepMm > 0)) {
    throw new RangeError(
      `a wanted thickness of ${wantedMinMm} mm in steps of ${stepMm} mm: give numbers above 0`,
    );
  }
  const least = ({ part, minMm }: SheetReport) => part?.minMm ?? minMm;
  const better = betterChange(formed);
  let gaugeMm = input.gaugeMm;
  let minMm = least(formed.report);
  let runs = 0;
  while (minMm < wantedMinMm && runs < MOST_RUNS) {
    const scaled = stepMm * Math.ceil((gaugeMm * wantedMinMm) / minMm / stepMm - 1e-9);
    if (!isUsualGauge(scaled, input.gaugeMm)) return { gaugeMm: null, scaledMm: scaled, minMm, runs, better };
    gaugeMm = scaled;
    minMm = least(formSheet({ ...input, gaugeMm }, { ...options, single: true }).report);
    runs++;
  }
  return { gaugeMm: minMm >= wantedMinMm ? gaugeMm : null, scaledMm: gaugeMm, minMm, runs, better };
}

/** Whether a gauge may be advised in the place of another: up to four times it, and no more than a recipe takes. */
export function isUsualGauge(gaugeMm: number, presentMm: number): boolean {
  return gaugeMm <= Math.min(MOST_FACTOR * presentMm, MOST_GAUGE_MM);
}

/**
 * What serves: gauge where much of the part is thin; else the template where it is thin: a radius in an inner corner, room in a
 * pit or slot, less height on a wall (own judgement, no source).
 */
export function betterChange({ report, minPlace, formedAreaMm2 }: FormedSheet): ThinRemedy {
  const { place, belowLimitAreaMm2, areaMm2 } = report.part ?? {
    place: minPlace,
    belowLimitAreaMm2: report.belowLimitAreaMm2,
    areaMm2: formedAreaMm2,
  };
  if (belowLimitAreaMm2 > LOCAL_SHARE * areaMm2) return 'gauge';
  if (place === 'inner-corner') return 'radius';
  if (place === 'pit' || place === 'web' || report.unclosedAreaMm2 > belowLimitAreaMm2) return 'gap';
  return place === 'wall' ? 'height' : 'gauge';
}
