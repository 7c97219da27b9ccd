import { centreX, centreY, type Grid } from '../dexel/grid';
import type { Mesh } from '../mesh/mesh';
import type { Point, Spacing } from '../report';
import type { FacetGrid } from './facet-grid';
import { findGrooves } from './find-grooves';
import type { Pit } from './find-pits';
import { findValleys } from './find-valleys';
import { measureGap } from './measure-gap';

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

/** A cut is made so far above the floor, or below the top, mm: the floor itself lies in no wall. */
const CUT_MM = 0.01;
/** Round the two nearest cells, walls are looked for this far, in cells and mm. */
const REACH_CELLS = 6;
const REACH_MM = 1.5;
const REACH_HEIGHTS = 1.5;
/** Nearer than this, mm, walls touch. */
const TOUCH_MM = 1e-3;
/** The foot of a wall over a rounded floor is found to this, mm. */
const FOOT_MM = 0.02;
/** Two bodies are parted by a valley where they meet within this below its floor, mm. */
const VALLEY_MM = 0.1;

/**
 * Gaps between neighbouring towers: islands of H above the bed, and above the floor of every valley between bodies (a
 * common plate, a groove, a saddle). The gap at the bed is the nearest distance of the two walls at their foot, where
 * they become steeper than 45°, the gap at the top that at the height of the lower; both are cut from the mesh, the grid only says where.
 */
export function findSpacing(
  mesh: Mesh,
  facets: FacetGrid,
  surface: Float64Array,
  grid: Grid,
  pits: readonly Pit[] = [],
): Spacing[] {
  const found = findGrooves(mesh, facets, surface, grid, pits, LEAST_HEIGHT_MM);
  const label = new Int32Array(surface.length);
  const below = new Int32Array(surface.length);
  for (const floor of findValleys(surface, grid, LEAST_HEIGHT_MM, MOST_LEVELS)) {
    const islands = findIslands(surface, grid, floor + LEAST_HEIGHT_MM / 20, label);
    if (islands.length < 2) continue;
    if (floor > 0) findIslands(surface, grid, Math.max(0, floor - VALLEY_MM), below);
    const pairs = nearestPairs(grid, label, islands, floor + LEAST_HEIGHT_MM);
    for (const pair of [...pairs.values()].sort((p, q) => p.gap - q.gap).slice(0, MOST_PAIRS)) {
      const [a, b] = [islands[pair.a], islands[pair.b]];
      // Parted by a lower valley: told there.
      if (floor > 0 && below[a.cells[0]] !== below[b.cells[0]]) continue;
      const top = Math.min(a.top, b.top);
      if (top - floor < LEAST_HEIGHT_MM || pair.gap <= 0) continue;
      const near = REACH_CELLS * grid.cell + REACH_MM;
      const cut = (z: number, p: number, q: number, reach = near, walls?: 'any') =>
        measureGap(mesh, facets, z, [centreX(grid, p), centreY(grid, p)], [centreX(grid, q), centreY(grid, q)], reach, walls); // prettier-ignore
      // Over a rounded floor the walls begin further out.
      const foot = findFoot(
        (z) => cut(z, pair.from, pair.to, z > floor + CUT_MM ? near + REACH_HEIGHTS * (top - floor) : near),
        floor,
        top,
      );
      // Slopes that lean further than 45° all the way are a hollow, not a gap.
      if (!foot && cut(floor + CUT_MM, pair.from, pair.to, near, 'any')) continue;
      const gapAtBedMm = foot ? foot.gap : pair.gap;
      const height = top - (foot ? foot.z : floor);
      // Walls that meet are one body, whatever the cells say.
      if (height < LEAST_HEIGHT_MM || gapAtBedMm < TOUCH_MM) continue;
      const upper = nearestAt(surface, grid, a, b, top);
      const atTop = cut(top - CUT_MM, upper.cells[0], upper.cells[1]);
      const point = (at: [number, number] | undefined, c: number): Point =>
        at ? [at[0], at[1], top] : [centreX(grid, c), centreY(grid, c), surface[c]];
      found.push({
        gapMm: Math.max(atTop ? atTop.gap : upper.gap, gapAtBedMm),
        gapAtBedMm,
        heightMm: height,
        heightOverGap: height / gapAtBedMm,
        between: [point(atTop?.from, upper.cells[0]), point(atTop?.to, upper.cells[1])],
      });
    }
  }
  return found.sort((a, b) => b.heightOverGap - a.heightOverGap).slice(0, MOST_PAIRS);
}

/** The lowest level at which two walls face each other: the floor, or where a rounded floor has become a wall. */
function findFoot(
  cut: (z: number) => { gap: number } | null,
  floor: number,
  top: number,
): { gap: number; z: number } | null {
  const atFloor = cut(floor + CUT_MM);
  if (atFloor) return { gap: atFloor.gap, z: floor };
  let high = top - CUT_MM;
  let found = cut(high);
  if (!found) return null;
  let low = floor;
  while (high - low > FOOT_MM) {
    const middle = (low + high) / 2;
    const there = cut(middle);
    if (there) [high, found] = [middle, there];
    else low = middle;
  }
  return { gap: found.gap, z: high };
}

function findIslands(surface: Float64Array, grid: Grid, above: number, label: Int32Array): Island[] {
  const { nx, ny } = grid;
  const islands: Island[] = [];
  const queue = new Int32Array(surface.length);
  label.fill(-1);
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
  /** Cells of a and b between which it is. */
  from: number;
  to: number;
}

/** Spreads every island that rises to `least` outwards cell by cell; where two fronts meet lies the gap between those two. */
function nearestPairs(grid: Grid, label: Int32Array, islands: Island[], least: number): Map<string, Pair> {
  const { nx, ny, cell } = grid;
  const owner = label.slice();
  const source = new Int32Array(label.length);
  let front: number[] = [];
  for (let c = 0; c < label.length; c++) {
    source[c] = c;
    if (label[c] < 0) continue;
    if (islands[label[c]].top < least) owner[c] = -1;
    else if (onRim(grid, label, c)) front.push(c);
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
          const turned = owner[n] < owner[c];
          const [a, b] = turned ? [owner[n], owner[c]] : [owner[c], owner[n]];
          const gap = Math.max(0, far(source[c], source[n]) - 1) * cell;
          const known = pairs.get(`${a},${b}`);
          const [from, to] = turned ? [source[n], source[c]] : [source[c], source[n]];
          if (!known || gap < known.gap) pairs.set(`${a},${b}`, { a, b, gap, from, to });
        } else if (label[n] !== owner[c] && far(n, source[c]) < far(n, source[n]) - 1e-9) {
          source[n] = source[c];
          next.push(n);
        }
      }
    }
    front = next;
  }
  return pairs;
}

/** An island's cells with a neighbour outside it: only they spread. */
function onRim({ nx, ny }: Grid, label: Int32Array, c: number): boolean {
  const i = c % nx;
  const own = label[c];
  return (
    (i > 0 && label[c - 1] !== own) ||
    (i + 1 < nx && label[c + 1] !== own) ||
    (c >= nx && label[c - nx] !== own) ||
    (c < nx * (ny - 1) && label[c + nx] !== own)
  );
}

/** The nearest cells of two islands at a height, found coarsely and then by going to and fro. */
function nearestAt(
  surface: Float64Array,
  grid: Grid,
  a: Island,
  b: Island,
  z: number,
): { gap: number; cells: [number, number] } {
  const { nx, cell } = grid;
  const least = z - 0.01 * z;
  const isHigh = (c: number) => surface[c] >= least;
  const high = (island: Island) => {
    const rim: number[] = [];
    for (const c of island.cells) {
      if (isHigh(c) && !(isHigh(c + 1) && isHigh(c - 1) && isHigh(c + nx) && isHigh(c - nx))) rim.push(c);
    }
    return rim;
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
  return { gap: Math.max(0, far(p, q) - 1) * cell, cells: [p, q] };
}
