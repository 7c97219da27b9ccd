import { centreX, centreY, type Grid } from '../dexel/grid';
import type { Point, Spacing } from '../report';

/** Neighbours lower than this over their common floor are not towers. */
const LEAST_HEIGHT_MM = 1;
const MOST_PAIRS = 60;
const MOST_LEVELS = 4;
/** Boundary cells tried in a first, coarse search for the nearest pair. */
const COARSE = 400;

interface Island {
  cells: Int32Array;
  top: number;
}

/**
 * Gaps between neighbouring towers: islands of H above the bed, and above every wide flat floor (a common plate).
 * The gap at the bed is taken where the two are nearest at that floor, the gap at the top at the height of the lower.
 */
export function findSpacing(surface: Float64Array, grid: Grid, heightMm: number): Spacing[] {
  const found: Spacing[] = [];
  for (const floor of floorLevels(surface, heightMm)) {
    const label = new Int32Array(surface.length).fill(-1);
    const islands = findIslands(surface, grid, floor + LEAST_HEIGHT_MM / 20, label);
    if (islands.length < 2) continue;
    const pairs = nearestPairs(grid, label);
    for (const pair of [...pairs.values()].sort((p, q) => p.gap - q.gap).slice(0, MOST_PAIRS)) {
      const [a, b] = [islands[pair.a], islands[pair.b]];
      const top = Math.min(a.top, b.top);
      const height = top - floor;
      if (height < LEAST_HEIGHT_MM || pair.gap <= 0) continue;
      const between = nearestAt(surface, grid, a, b, top);
      found.push({
        gapMm: Math.max(between.gap, pair.gap),
        gapAtBedMm: pair.gap,
        heightMm: height,
        heightOverGap: height / pair.gap,
        between: between.points,
      });
    }
  }
  return found.sort((a, b) => b.heightOverGap - a.heightOverGap).slice(0, MOST_PAIRS);
}

/** The bed, and heights at which much of the surface lies flat. */
function floorLevels(surface: Float64Array, heightMm: number): number[] {
  const step = Math.max(heightMm / 400, 1e-6);
  const bins = new Uint32Array(402);
  let covered = 0;
  for (const h of surface) {
    if (h <= 0) continue;
    covered++;
    bins[Math.min(401, Math.floor(h / step))]++;
  }
  const floors: { at: number; cells: number }[] = [];
  for (let b = 1; b < 360; b++)
    if (bins[b] > covered * 0.08) floors.push({ at: (b + 1) * step, cells: bins[b] });
  floors.sort((p, q) => q.cells - p.cells);
  return [0, ...floors.slice(0, MOST_LEVELS - 1).map((floor) => floor.at)];
}

function findIslands(surface: Float64Array, grid: Grid, above: number, label: Int32Array): Island[] {
  const { nx, ny } = grid;
  const islands: Island[] = [];
  const queue = new Int32Array(surface.length);
  let end = 0;
  for (let first = 0; first < surface.length; first++) {
    if (label[first] >= 0 || surface[first] <= above) continue;
    const begin = end;
    queue[end++] = first;
    let top = 0;
    label[first] = islands.length;
    for (let at = begin; at < end; at++) {
      const c = queue[at];
      const i = c % nx;
      if (surface[c] > top) top = surface[c];
      for (let dy = c >= nx ? -nx : 0; dy <= (c < nx * (ny - 1) ? nx : 0); dy += nx) {
        for (let dx = i > 0 ? -1 : 0; dx <= (i + 1 < nx ? 1 : 0); dx++) {
          const n = c + dy + dx;
          if (label[n] >= 0 || surface[n] <= above) continue;
          label[n] = islands.length;
          queue[end++] = n;
        }
      }
    }
    islands.push({ cells: queue.subarray(begin, end), top });
  }
  return islands;
}

interface Pair {
  a: number;
  b: number;
  gap: number;
}

/** Spreads every island outwards cell by cell; where two fronts meet lies the gap between those two. */
function nearestPairs(grid: Grid, label: Int32Array): Map<string, Pair> {
  const { nx, ny, cell } = grid;
  const owner = label.slice();
  const source = new Int32Array(label.length);
  let front: number[] = [];
  for (let c = 0; c < label.length; c++) {
    source[c] = c;
    if (label[c] >= 0) front.push(c);
  }
  const far = (a: number, b: number) =>
    Math.hypot((a % nx) - (b % nx), Math.floor(a / nx) - Math.floor(b / nx));
  const pairs = new Map<string, Pair>();
  while (front.length > 0) {
    const next: number[] = [];
    for (const c of front) {
      for (const side of [1, -1, nx, -nx]) {
        const i = c % nx;
        if ((side === 1 && i === nx - 1) || (side === -1 && i === 0)) continue;
        const n = c + side;
        if (n < 0 || n >= nx * ny) continue;
        if (owner[n] < 0) {
          owner[n] = owner[c];
          source[n] = source[c];
          next.push(n);
        } else if (owner[n] !== owner[c]) {
          const [a, b] = owner[n] < owner[c] ? [owner[n], owner[c]] : [owner[c], owner[n]];
          const gap = Math.max(0, far(source[c], source[n]) - 1) * cell;
          const known = pairs.get(`${a},${b}`);
          if (!known || gap < known.gap) pairs.set(`${a},${b}`, { a, b, gap });
        } else if (label[n] < 0 && far(n, source[c]) < far(n, source[n]) - 1e-9) {
          source[n] = source[c];
          next.push(n);
        }
      }
    }
    front = next;
  }
  return pairs;
}

/** The nearest points of two islands at a height, found coarsely and then by going to and fro. */
function nearestAt(
  surface: Float64Array,
  grid: Grid,
  a: Island,
  b: Island,
  z: number,
): { gap: number; points: [Point, Point] } {
  const { nx, cell } = grid;
  const high = (island: Island) => {
    const cells = island.cells.filter((c) => surface[c] >= z - 0.01 * z);
    return Array.from(cells).filter((c) =>
      [1, -1, nx, -nx].some((side) => !(surface[c + side] >= z - 0.01 * z)),
    );
  };
  const [as, bs] = [high(a), high(b)];
  const far = (p: number, q: number) =>
    Math.hypot((p % nx) - (q % nx), Math.floor(p / nx) - Math.floor(q / nx));
  const nearest = (to: number, among: number[]) =>
    among.reduce((best, c) => (far(c, to) < far(best, to) ? c : best));
  let p = as[0];
  let q = bs[0];
  const stride = (list: number[]) => Math.max(1, Math.floor(list.length / COARSE));
  for (let i = 0; i < as.length; i += stride(as)) {
    for (let j = 0; j < bs.length; j += stride(bs)) {
      if (far(as[i], bs[j]) < far(p, q)) [p, q] = [as[i], bs[j]];
    }
  }
  for (let round = 0; round < 4; round++) {
    q = nearest(p, bs);
    p = nearest(q, as);
  }
  const point = (c: number): Point => [centreX(grid, c), centreY(grid, c), surface[c]];
  return { gap: Math.max(0, far(p, q) - 1) * cell, points: [point(p), point(q)] };
}
