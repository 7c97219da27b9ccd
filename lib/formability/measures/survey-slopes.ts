import type { Part } from '../survey-part';
import type { FormedSheet } from '../sheet/form-sheet';
import type { Point } from '../report';
import { DEG, VERTICAL_DEG } from './thresholds';

/** Slopes of like draft that the sheet touches. */
export interface Slope {
  /** Area-weighted mean. */
  draftDeg: number;
  areaMm2: number;
  /** Thinnest formed sheet found there, in gauges, and where; null without a run of the sheet. */
  thinnest: { gauges: number; at: Point } | null;
}

/** What the sheet touches, sorted by slope. */
export interface Slopes {
  slopes: Slope[];
  /** Plan area of what is flatter than 60°, flat tops included: where the sheet chills first. */
  topAreaMm2: number;
}

const TOP_DEG = 60;
/** Classes by the cosine of the draft, finer towards flat tops, whose steps are long. */
const CLASSES = 200;
const FLAT_DEG = 89.5;
/** Places at which the formed sheet is asked for its thickness, about. */
const LOOKS = 4000;

/**
 * Slopes with 0.25° < draft < 89.5° that the sheet touches, by draft: what the layers' steps hang on, whatever the layer.
 * @param formed sheet and its gauge, where it was run
 */
export function surveySlopes(
  {
    prepared: { mesh },
    facets,
    visibility,
    holes,
  }: Pick<Part, 'prepared' | 'facets' | 'visibility' | 'holes'>,
  formed: { sheet: FormedSheet; gaugeMm: number } | null,
): Slopes {
  const { area, nz, bed } = facets;
  const low = Math.sin(VERTICAL_DEG / DEG);
  const high = Math.sin(FLAT_DEG / DEG);
  const total = new Float64Array(CLASSES);
  const moment = new Float64Array(CLASSES);
  const thinnest = new Array<Slope['thinnest']>(CLASSES).fill(null);
  const top = Math.sin(TOP_DEG / DEG);
  const faces = (t: number) => !bed[t] && !holes.bore[t] && nz[t] > low && visibility.visible[t] >= 0.5;
  const touched = (t: number) => nz[t] < high && faces(t);
  let [sum, count, topAreaMm2] = [0, 0, 0];
  for (let t = 0; t < area.length; t++) {
    if (!faces(t)) continue;
    if (nz[t] >= top) topAreaMm2 += area[t] * nz[t];
    if (nz[t] >= high) continue;
    const cosine = Math.sqrt(1 - nz[t] * nz[t]);
    const k = Math.min(CLASSES - 1, Math.floor(cosine * CLASSES));
    total[k] += area[t];
    moment[k] += area[t] * cosine;
    sum += area[t];
    count++;
  }
  if (formed) {
    const every = Math.max(1, Math.floor(count / LOOKS));
    let seen = 0;
    for (let t = 0; t < area.length; t++) {
      if (!touched(t) || (seen++ % every !== 0 && area[t] < sum / LOOKS)) continue;
      const k = Math.min(CLASSES - 1, Math.floor(Math.sqrt(1 - nz[t] * nz[t]) * CLASSES));
      for (const at of placesOn(mesh, t)) {
        const gauges = formed.sheet.thicknessAt(...at) / formed.gaugeMm;
        if (gauges > 0 && gauges < (thinnest[k]?.gauges ?? Infinity)) thinnest[k] = { gauges, at };
      }
    }
  }
  const slopes: Slope[] = [];
  for (let k = 0; k < CLASSES; k++) {
    if (total[k] === 0) continue;
    const draftDeg = Math.acos(Math.min(1, moment[k] / total[k])) * DEG;
    slopes.push({ draftDeg, areaMm2: total[k], thinnest: thinnest[k] });
  }
  return { slopes, topAreaMm2 };
}

/** The middle of a facet and three places towards its corners, in the file's own frame. */
function placesOn({ position: p, index, centre }: Part['prepared']['mesh'], t: number): Point[] {
  const corner = (c: number): Point => {
    const k = 3 * index[3 * t + c];
    return [p[k] + centre[0], p[k + 1] + centre[1], p[k + 2]];
  };
  const corners = [corner(0), corner(1), corner(2)];
  const middle = [0, 1, 2].map((axis) => (corners[0][axis] + corners[1][axis] + corners[2][axis]) / 3);
  const towards = (c: Point): Point => [
    (middle[0] + 3 * c[0]) / 4,
    (middle[1] + 3 * c[1]) / 4,
    (middle[2] + 3 * c[2]) / 4,
  ];
  return [[middle[0], middle[1], middle[2]], ...corners.map(towards)];
}
