import type { Point } from '../report';
import type { Membrane } from './membrane';
import type { Stretches } from './measure-elements';

/** Diameter of the disc over which least thickness is averaged, mm (engine contract). */
export const DISC_MM = 3;
/** Spacing of the points that stand for the surface, mm, and the finest subdivision of one element's side. */
const SPACING_MM = 0.6;
const MOST_PARTS = 24;
/** Share of the formed area, thinnest first, in which the disc's centre is looked for. */
const SEARCHED = 0.1;
/** A disc that is cut off, by the frame or a zone's edge, counts from this share of its area on. */
const LEAST_SHARE = 0.3;

export type Keep = (x: number, y: number, z: number) => boolean;

export interface Thinnest {
  minMm: number;
  at: Point;
}

/**
 * Least thickness averaged over a disc of 3 mm diameter on the formed surface. Elements are cut into points of equal
 * area with the element's thickness (nodes' means are up to half again too thick at an inner corner); a disc is all
 * points within 1.5 mm of its centre, and centres are the nodes and middles of the thinnest tenth of the surface.
 * @param thinFirst element numbers by rising thickness: all, or those of a zone
 * @param keep whether a point belongs to the zone; a disc at its edge is the part of it that does
 */
export function findThinnest(
  sheet: Membrane,
  stretches: Stretches,
  thinFirst: Uint32Array,
  keep: Keep = () => true,
): Thinnest {
  const centres = listCentres(sheet, stretches, thinFirst, keep);
  const bins = makeBins(centres);
  const cloud = scatter(sheet, stretches, bins, keep);
  let best: Thinnest = { minMm: Infinity, at: [0, 0, 0] };
  for (let k = 0; k < centres.length; k += 3) {
    const mean = meanAround(cloud, bins, centres[k], centres[k + 1], centres[k + 2]);
    if (mean < best.minMm) best = { minMm: mean, at: [centres[k], centres[k + 1], centres[k + 2]] };
  }
  return best;
}

function listCentres(sheet: Membrane, { area }: Stretches, thinFirst: Uint32Array, keep: Keep): Float64Array {
  const { corners, at } = sheet;
  const whole = thinFirst.reduce((sum, e) => sum + area[e], 0);
  const centres = new Float64Array(12 * thinFirst.length);
  const taken = new Uint8Array(sheet.nodes);
  let end = 0;
  let covered = 0;
  for (let k = 0; k < thinFirst.length && covered <= SEARCHED * whole; k++) {
    const e = thinFirst[k];
    covered += area[e];
    for (let axis = 0; axis < 3; axis++) {
      const sum = at[3 * corners[3 * e] + axis] + at[3 * corners[3 * e + 1] + axis] + at[3 * corners[3 * e + 2] + axis]; // prettier-ignore
      centres[end++] = sum / 3;
    }
    if (!keep(centres[end - 3], centres[end - 2], centres[end - 1])) end -= 3;
    for (let c = 3 * e; c < 3 * e + 3; c++) {
      const n = corners[c];
      if (taken[n] || !keep(at[3 * n], at[3 * n + 1], at[3 * n + 2])) continue;
      taken[n] = 1;
      for (let axis = 0; axis < 3; axis++) centres[end++] = at[3 * n + axis];
    }
  }
  return centres.slice(0, end);
}

/** Square bins of one disc radius over the plan of the centres; `wanted` where a disc can reach. */
interface Bins {
  x0: number;
  y0: number;
  nx: number;
  ny: number;
  wanted: Uint8Array;
}

const RADIUS = DISC_MM / 2;

function makeBins(centres: Float64Array): Bins {
  let [x0, y0, x1, y1] = [Infinity, Infinity, -Infinity, -Infinity];
  for (let k = 0; k < centres.length; k += 3) {
    x0 = Math.min(x0, centres[k]);
    y0 = Math.min(y0, centres[k + 1]);
    x1 = Math.max(x1, centres[k]);
    y1 = Math.max(y1, centres[k + 1]);
  }
  x0 -= 2 * RADIUS;
  y0 -= 2 * RADIUS;
  const nx = Math.floor((x1 - x0) / RADIUS) + 3;
  const ny = Math.floor((y1 - y0) / RADIUS) + 3;
  const bins: Bins = { x0, y0, nx, ny, wanted: new Uint8Array(nx * ny) };
  for (let k = 0; k < centres.length; k += 3) {
    const c = binAt(bins, centres[k], centres[k + 1]);
    for (let row = c - nx; row <= c + nx; row += nx) bins.wanted.fill(1, row - 1, row + 2);
  }
  return bins;
}

function binAt({ x0, y0, nx, ny }: Bins, x: number, y: number): number {
  const i = Math.floor((x - x0) / RADIUS);
  const j = Math.floor((y - y0) / RADIUS);
  return i < 1 || j < 1 || i >= nx - 1 || j >= ny - 1 ? 0 : j * nx + i;
}

/** Points of the surface in the wanted bins, bin by bin: x, y, z, area, thickness. */
interface Cloud {
  start: Uint32Array;
  values: Float64Array;
}

function scatter(sheet: Membrane, stretches: Stretches, bins: Bins, keep: Keep): Cloud {
  const start = new Uint32Array(bins.wanted.length + 1);
  eachPoint(sheet, stretches, bins, keep, (bin) => start[bin + 1]++);
  for (let b = 0; b < bins.wanted.length; b++) start[b + 1] += start[b];
  const next = start.slice();
  const values = new Float64Array(5 * start[bins.wanted.length]);
  eachPoint(sheet, stretches, bins, keep, (bin, x, y, z, area, thickness) => {
    const k = 5 * next[bin]++;
    values[k] = x;
    values[k + 1] = y;
    values[k + 2] = z;
    values[k + 3] = area;
    values[k + 4] = thickness;
  });
  return { start, values };
}

type Visit = (bin: number, x: number, y: number, z: number, area: number, thickness: number) => void;

function eachPoint(sheet: Membrane, stretches: Stretches, bins: Bins, keep: Keep, visit: Visit): void {
  const { at, corners, elements } = sheet;
  for (let e = 0; e < elements; e++) {
    const [a, b, c] = [corners[3 * e], corners[3 * e + 1], corners[3 * e + 2]];
    const [p, q, r] = [3 * a, 3 * b, 3 * c];
    if (!reaches(bins, at, p, q, r)) continue;
    const side = Math.max(distance(at, p, q), distance(at, q, r), distance(at, r, p));
    const parts = Math.min(MOST_PARTS, Math.max(1, Math.ceil(side / SPACING_MM)));
    const area = stretches.area[e] / (parts * parts);
    for (let i = 0; i < parts; i++) {
      for (let j = 0; j < 2 * (parts - i) - 1; j++) {
        // Middles of the parts × parts equal triangles, upright and inverted in turn.
        const third = j & 1 ? 2 / 3 : 1 / 3;
        const u = (i + third) / parts;
        const v = ((j >> 1) + third) / parts;
        const w = 1 - u - v;
        const x = w * at[p] + u * at[q] + v * at[r];
        const y = w * at[p + 1] + u * at[q + 1] + v * at[r + 1];
        const bin = binAt(bins, x, y);
        if (!bins.wanted[bin]) continue;
        const z = w * at[p + 2] + u * at[q + 2] + v * at[r + 2];
        if (keep(x, y, z)) visit(bin, x, y, z, area, stretches.thickness[e]);
      }
    }
  }
}

/** Whether a wanted bin lies in the plan box of a triangle. */
function reaches(bins: Bins, at: Float64Array, p: number, q: number, r: number): boolean {
  const from = (low: number, start: number) => Math.floor((low - start) / RADIUS);
  const i0 = Math.max(1, from(Math.min(at[p], at[q], at[r]), bins.x0));
  const i1 = Math.min(bins.nx - 2, from(Math.max(at[p], at[q], at[r]), bins.x0));
  const j0 = Math.max(1, from(Math.min(at[p + 1], at[q + 1], at[r + 1]), bins.y0));
  const j1 = Math.min(bins.ny - 2, from(Math.max(at[p + 1], at[q + 1], at[r + 1]), bins.y0));
  for (let j = j0; j <= j1; j++) {
    for (let i = i0; i <= i1; i++) if (bins.wanted[j * bins.nx + i]) return true;
  }
  return false;
}

function distance(at: Float64Array, p: number, q: number): number {
  return Math.sqrt((at[p] - at[q]) ** 2 + (at[p + 1] - at[q + 1]) ** 2 + (at[p + 2] - at[q + 2]) ** 2);
}

function meanAround({ start, values }: Cloud, bins: Bins, x: number, y: number, z: number): number {
  const bin = binAt(bins, x, y);
  let area = 0;
  let volume = 0;
  for (let row = bin - bins.nx; row <= bin + bins.nx; row += bins.nx) {
    for (let k = 5 * start[row - 1], end = 5 * start[row + 2]; k < end; k += 5) {
      const far = (values[k] - x) ** 2 + (values[k + 1] - y) ** 2 + (values[k + 2] - z) ** 2;
      if (far > RADIUS * RADIUS) continue;
      area += values[k + 3];
      volume += values[k + 3] * values[k + 4];
    }
  }
  return area > LEAST_SHARE * Math.PI * RADIUS ** 2 ? volume / area : Infinity;
}
