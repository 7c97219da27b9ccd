import type { Check } from '../report';
import { say } from './basis';
import type { CheckInput } from './check-input';

const STANDARD = 0.4;
const SIZES = [0.2, 0.25, 0.3, 0.4, 0.5, 0.6, 0.8, 1];
/** Lines that the thinnest wall needs side by side. */
const LINES = 2;
const LINE_PER_NOZZLE = 1.125;

/** Does the nozzle suit the size and the finest detail (thinnest wall, narrowest gap)? */
export function checkNozzle({ recipe, report, sizeMm }: CheckInput): Check {
  const { limits, print } = recipe;
  const long = Math.max(sizeMm[0], sizeMm[1]);
  const gaps = report.spacing.map((pair) => pair.gapAtBedMm).filter((gap) => gap > 0);
  const finest = Math.min(report.walls.minMm ?? Infinity, ...gaps);
  const byDetail = finest / (LINES * LINE_PER_NOZZLE);
  const bySize = long >= limits.largeTemplateMm ? 0.6 : long <= limits.smallTemplateMm ? STANDARD : 0.5;
  const most = Math.min(byDetail, bySize);
  const suited = [...SIZES].reverse().find((size) => size <= most + 1e-9) ?? SIZES[0];
  const coarse = print.nozzleMm > most + 1e-9;
  const slow = long >= limits.largeTemplateMm && print.nozzleMm < 0.3;
  const detail = Number.isFinite(finest) ? ` and a finest detail of ${say(finest, 2)} mm` : '';
  return {
    id: 'nozzle',
    status: coarse || slow ? 'caution' : 'pass',
    measured: print.nozzleMm,
    limit: slow ? STANDARD : Number(most.toFixed(3)),
    unit: 'mm',
    basis: {
      source: 'common practice, no source: 0.4 mm as the standard, smaller for small precise templates, larger for large simple ones; two lines to the thinnest wall', // prettier-ignore
      kind: 'common practice',
    },
    message: coarse
      ? `A ${say(print.nozzleMm, 2)} mm nozzle is too wide for ${say(long, 0)} mm of length${detail}.`
      : slow
        ? `A ${say(print.nozzleMm, 2)} mm nozzle will take very long over ${say(long, 0)} mm of length.`
        : `A ${say(print.nozzleMm, 2)} mm nozzle suits ${say(long, 0)} mm of length${detail}.`,
    remedy: coarse
      ? `Use a ${say(suited, 2)} mm nozzle.`
      : slow
        ? `Use a ${say(STANDARD, 2)} mm nozzle.`
        : '',
    places: [],
  };
}
