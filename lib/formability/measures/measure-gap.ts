import type { Mesh } from '../mesh/mesh';
import type { FacetGrid } from './facet-grid';

/** More cut segments than this on a side are thinned out: a fine mesh needs no more. */
const MOST_SEGMENTS = 400;

export interface Gap {
  gap: number;
  from: [number, number];
  to: [number, number];
}

/**
 * The exact gap at a height between two walls that face each other near two points: the facets near them are cut by
 * the level plane, and the nearest points of the cuts are taken between those that face to and fro.
 * @param reach how far round the two points walls are looked for, mm
 * @param walls `steep`: only faces nearer to upright than to level; the rest is floor
 * @returns null where no two walls face each other there
 */
export function measureGap(
  mesh: Mesh,
  grid: FacetGrid,
  z: number,
  p: readonly [number, number],
  q: readonly [number, number],
  reach: number,
  walls: 'steep' | 'any' = 'steep',
): Gap | null {
  const span = Math.hypot(q[0] - p[0], q[1] - p[1]) || 1;
  const [dx, dy] = [(q[0] - p[0]) / span, (q[1] - p[1]) / span];
  const near: number[][] = [[], []];
  const box = [
    Math.min(p[0], q[0]) - reach,
    Math.min(p[1], q[1]) - reach,
    Math.max(p[0], q[0]) + reach,
    Math.max(p[1], q[1]) + reach,
  ];
  for (const t of facetsAt(grid, z, box)) {
    const cut = cutFacet(mesh, t, z);
    if (!cut) continue;
    const [ax, ay, bx, by, nx, ny, nz] = cut;
    if (walls === 'steep' && nx * nx + ny * ny < nz * nz) continue;
    const facing = (nx * dx + ny * dy) / Math.hypot(nx, ny);
    const along = ((ax + bx) / 2 - p[0]) * dx + ((ay + by) / 2 - p[1]) * dy;
    // Walls of the first look towards the second, stand nearer to it, and the other way round.
    if (facing > 0.2 && along < span / 2) near[0].push(ax, ay, bx, by);
    else if (facing < -0.2 && along > span / 2) near[1].push(ax, ay, bx, by);
  }
  const [as, bs] = near.map(thinned);
  let best: Gap | null = null;
  for (let i = 0; i < as.length; i += 4) {
    for (let j = 0; j < bs.length; j += 4) {
      for (let end = 0; end < 4; end++) {
        const [point, segment, k] = end < 2 ? [as, bs, j] : [bs, as, i];
        const at = (end < 2 ? i : j) + 2 * (end & 1);
        const foot = footOn(segment, k, point[at], point[at + 1]);
        const gap = Math.hypot(foot[0] - point[at], foot[1] - point[at + 1]);
        if (best && gap >= best.gap) continue;
        const own: [number, number] = [point[at], point[at + 1]];
        best = end < 2 ? { gap, from: own, to: foot } : { gap, from: foot, to: own };
      }
    }
  }
  return best;
}

/** Facets listed in the cells of a box round a level plane, each once. */
function facetsAt(grid: FacetGrid, z: number, box: readonly number[]): Set<number> {
  const { cell, count, low, start, facet } = grid;
  const clamp = (value: number, k: number) =>
    Math.min(count[k] - 1, Math.max(0, Math.floor((value - low[k]) / cell)));
  const k = clamp(z, 2);
  const found = new Set<number>();
  for (let j = clamp(box[1], 1); j <= clamp(box[3], 1); j++) {
    for (let i = clamp(box[0], 0); i <= clamp(box[2], 0); i++) {
      const c = (k * count[1] + j) * count[0] + i;
      for (let e = start[c]; e < start[c + 1]; e++) found.add(facet[e]);
    }
  }
  return found;
}

/** Ends of the facet's cut by the plane, and its normal (not of length 1); null where it is not cut. */
function cutFacet(mesh: Mesh, t: number, z: number): number[] | null {
  const { index, position: p } = mesh;
  const v = [0, 1, 2].map((k) => index[3 * t + k] * 3);
  const ends: number[] = [];
  for (let k = 0; k < 3; k++) {
    const [a, b] = [v[k], v[(k + 1) % 3]];
    if (p[a + 2] <= z === p[b + 2] <= z) continue;
    const s = (z - p[a + 2]) / (p[b + 2] - p[a + 2]);
    ends.push(p[a] + s * (p[b] - p[a]), p[a + 1] + s * (p[b + 1] - p[a + 1]));
  }
  if (ends.length !== 4) return null;
  const [a, b, d] = v;
  const [ux, uy, uz] = [p[b] - p[a], p[b + 1] - p[a + 1], p[b + 2] - p[a + 2]];
  const [vx, vy, vz] = [p[d] - p[a], p[d + 1] - p[a + 1], p[d + 2] - p[a + 2]];
  return [...ends, uy * vz - uz * vy, uz * vx - ux * vz, ux * vy - uy * vx];
}

function thinned(segments: number[]): number[] {
  const stride = Math.ceil(segments.length / 4 / MOST_SEGMENTS);
  if (stride <= 1) return segments;
  return segments.filter((_, k) => Math.floor(k / 4) % stride === 0);
}

function footOn(segments: number[], k: number, x: number, y: number): [number, number] {
  const [ax, ay] = [segments[k], segments[k + 1]];
  const [ux, uy] = [segments[k + 2] - ax, segments[k + 3] - ay];
  const squared = ux * ux + uy * uy;
  const s = squared > 0 ? Math.min(1, Math.max(0, ((x - ax) * ux + (y - ay) * uy) / squared)) : 0;
  return [ax + s * ux, ay + s * uy];
}
