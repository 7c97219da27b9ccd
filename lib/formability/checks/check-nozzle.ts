import type { Check, Point } from '../report';
import { roundUp, say, sayPlace } from './basis';
import type { CheckInput } from './check-input';

const STANDARD = 0.4;
/** Nozzles that are sold up to the widest that any size of template asks for, mm. */
const SIZES = [0.2, 0.25, 0.3, 0.4, 0.5, 0.6];
/** Lines that the thinnest solid needs side by side, and that the narrowest gap must be wide to stay open. */
const LINES = { feature: 2, gap: 1 };
/** Finer than this over a large template takes very long. */
const FINE = 0.3;
/** What float32 corners round away, mm. */
const ROUNDING = 1e-3;

interface Detail {
  kind: keyof typeof LINES;
  mm: number;
  at: Point | null;
}

/** Does the nozzle suit the size and the finest detail (thinnest solid, narrowest gap)? */
export function checkNozzle({ recipe, report, sizeMm }: CheckInput): Check {
  const { limits, print } = recipe;
  const long = Math.max(sizeMm[0], sizeMm[1]);
  const large = long >= limits.largeTemplateMm;
  const perNozzle = print.lineMm / print.nozzleMm;
  const widest = ({ kind, mm }: Detail) => mm / (LINES[kind] * perNozzle);
  const [detail] = detailsOf(report).sort((a, b) => widest(a) - widest(b));
  const byDetail = detail ? widest(detail) : Infinity;
  const bySize = large ? 0.6 : long <= limits.smallTemplateMm ? STANDARD : 0.5;
  const most = Math.min(byDetail, bySize);
  const suited = largestUpTo(most);
  const coarse = print.nozzleMm > most + ROUNDING;
  const usual = largestUpTo(Math.min(byDetail, STANDARD));
  const slow = large && print.nozzleMm < FINE && usual > print.nozzleMm;
  const told = detail ? ` and a finest detail of ${describe(detail)}` : '';
  const nozzle = `A ${say(print.nozzleMm, 2)} mm nozzle`;
  return {
    id: 'nozzle',
    status: coarse || slow ? 'caution' : 'pass',
    measured: print.nozzleMm,
    limit: slow && !coarse ? usual : Number(most.toFixed(3)),
    unit: 'mm',
    basis: {
      source: 'common practice, no source: 0.4 mm as the standard, smaller for small precise templates, larger for large simple ones; two lines to the thinnest solid, one to the narrowest gap', // prettier-ignore
      kind: 'common practice',
    },
    message: coarse
      ? `${nozzle} is too wide for ${say(long, 0)} mm of length${told}.`
      : slow
        ? `${nozzle} will take very long over ${say(long, 0)} mm of length.`
        : `${nozzle} suits ${say(long, 0)} mm of length${told}.${suited > print.nozzleMm ? ` Up to ${say(suited, 2)} mm would do, and print faster.` : ''}`,
    remedy: coarse
      ? remedyFor(
          byDetail < bySize ? detail : null,
          suited,
          suited <= most + ROUNDING,
          print.nozzleMm,
          perNozzle,
        )
      : slow
        ? `Use a ${say(usual, 2)} mm nozzle.`
        : '',
    places: coarse && byDetail < bySize && detail.at ? [{ at: detail.at, areaMm2: 0 }] : [],
  };
}

function detailsOf({ detail }: CheckInput['report']): Detail[] {
  const { smallestFeatureMm, smallestFeatureAt, smallestGapMm, smallestGapAt } = detail;
  const all: Detail[] = [];
  if (smallestFeatureMm !== null) all.push({ kind: 'feature', mm: smallestFeatureMm, at: smallestFeatureAt });
  if (smallestGapMm !== null) all.push({ kind: 'gap', mm: smallestGapMm, at: smallestGapAt });
  return all;
}

function largestUpTo(most: number): number {
  return [...SIZES].reverse().find((size) => size <= most + ROUNDING) ?? SIZES[0];
}

function describe({ kind, mm }: Detail): string {
  return `${say(mm, 2)} mm (${kind === 'gap' ? 'a gap' : 'solid'})`;
}

/** A finer nozzle, or a wider detail; where no nozzle is fine enough, both. */
function remedyFor(
  detail: Detail | null,
  suited: number,
  isFine: boolean,
  nozzle: number,
  perNozzle: number,
): string {
  if (!detail) return `Use a ${say(suited, 2)} mm nozzle.`;
  const where = detail.at ? ` at ${sayPlace(detail.at)}` : '';
  const what = detail.kind === 'gap' ? 'gap' : 'detail';
  const wide = (size: number) => say(roundUp(LINES[detail.kind] * perNozzle * size, 0.05), 2);
  return isFine
    ? `Use a ${say(suited, 2)} mm nozzle, or widen the ${what}${where} to ${wide(nozzle)} mm.`
    : `No nozzle is fine enough: widen the ${what}${where} to ${wide(suited)} mm and use a ${say(suited, 2)} mm nozzle, or to ${wide(nozzle)} mm with this one.`; // prettier-ignore
}
