import { floodFrom } from '../dexel/flood-from';
import { cellAt, centreX, centreY, type Grid } from '../dexel/grid';
import { ringToFoot, webCriterion } from '../physics/web-criterion';
import type { Point, Spacing } from '../report';
import type { WebReport, WebRing } from '../report-forming';

/** Higher than this stands above the bed, mm. */
const STANDS_MM = 0.05;
const DIRECTIONS = 48;

/**
 * Hoop against meridian stretch of the ring of sheet that ends at the foot: round the whole template, towards the frame,
 * and round the smaller of the two neighbours that stand tightest, each with half of the gap between.
 * @param surface H with vents closed, and pairs of neighbours, in the grid's frame
 */
export function estimateWeb(
  part: { surface: Float64Array; grid: Grid; spacing: Spacing[]; size: Point },
  frameMm: readonly [number, number],
): WebReport {
  const { surface, grid, spacing, size } = part;
  const gapMm = Math.max(frameMm[0] - size[0], frameMm[1] - size[1]) / 2;
  const tightest = spacing.reduce<Spacing | null>(
    (most, pair) => (most && most.heightOverGap >= pair.heightOverGap ? most : pair),
    null,
  );
  return {
    outside: ring(
      hullPerimeter(grid, (c) => surface[c] > STANDS_MM),
      gapMm,
      size[2],
    ),
    neighbours: tightest && aroundNeighbour(surface, grid, tightest),
  };
}

function aroundNeighbour(surface: Float64Array, grid: Grid, pair: Spacing): WebRing | null {
  // Halfway up the lower one, where the two are still apart.
  const level = pair.heightMm / 2;
  const perimeters = pair.between.map(([x, y]) => {
    const first = nearestAbove(surface, grid, cellAt(grid, x, y), level);
    const seen = first < 0 ? null : floodFrom(grid, first, (c) => surface[c] > level).seen;
    return seen ? hullPerimeter(grid, (c) => seen[c] === 1) : 0;
  });
  const gap = pair.gapAtBedMm > 0 ? pair.gapAtBedMm : pair.gapMm;
  return ring(Math.min(...perimeters), gap / 2, pair.heightMm);
}

function ring(perimeterMm: number, gapMm: number, heightMm: number): WebRing | null {
  if (!(perimeterMm > 0) || !(gapMm > 0) || !(heightMm > 0)) return null;
  const judge = (gap: number) => {
    const { ringMm, meridian } = ringToFoot(gap, heightMm);
    return { ringMm, ...webCriterion(perimeterMm, ringMm, meridian) };
  };
  const found = judge(gapMm);
  return {
    perimeterMm,
    gapMm,
    heightMm,
    ...found,
    gapThatHoldsMm: found.webs ? widestThatHolds(judge, gapMm) : null,
  };
}

/** A narrower gap draws the sheet more along the meridian and leaves less to gather. */
function widestThatHolds(judge: (gap: number) => { webs: boolean }, gapMm: number): number | null {
  let [low, high] = [gapMm / 1000, gapMm];
  if (judge(low).webs) return null;
  for (let round = 0; round < 40; round++) {
    const middle = (low + high) / 2;
    if (judge(middle).webs) high = middle;
    else low = middle;
  }
  return low;
}

/** Perimeter of the convex outline of some cells, mm: π times their mean width over all directions (Cauchy). */
function hullPerimeter(grid: Grid, holds: (cell: number) => boolean): number {
  const { nx, ny } = grid;
  const xs: number[] = [];
  const ys: number[] = [];
  for (let j = 0; j < ny; j++) {
    let [left, right] = [0, nx - 1];
    while (left < nx && !holds(j * nx + left)) left++;
    if (left === nx) continue;
    while (!holds(j * nx + right)) right--;
    // The outline runs along the cells' borders.
    for (const c of [j * nx + left, j * nx + right]) {
      const side = c % nx === left ? -0.5 : 0.5;
      xs.push(centreX(grid, c) + side * grid.cell);
      ys.push(centreY(grid, c));
    }
    if (left === right) {
      xs.push(centreX(grid, j * nx + left) + grid.cell / 2);
      ys.push(centreY(grid, j * nx + left));
    }
  }
  if (xs.length === 0) return 0;
  let sum = 0;
  for (let k = 0; k < DIRECTIONS; k++) {
    const angle = (Math.PI * k) / DIRECTIONS;
    const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
    let [low, high] = [Infinity, -Infinity];
    for (let i = 0; i < xs.length; i++) {
      const at = xs[i] * cos + ys[i] * sin;
      if (at < low) low = at;
      if (at > high) high = at;
    }
    sum += high - low + grid.cell * Math.abs(sin);
  }
  return (Math.PI * sum) / DIRECTIONS;
}

/** A cell above a level at or close to another; −1 where none is near. */
function nearestAbove(surface: Float64Array, { nx, ny }: Grid, from: number, level: number): number {
  const [i0, j0] = [from % nx, Math.floor(from / nx)];
  for (let reach = 0; reach < Math.max(nx, ny) / 4; reach++) {
    for (let j = Math.max(0, j0 - reach); j <= Math.min(ny - 1, j0 + reach); j++) {
      const whole = Math.abs(j - j0) === reach;
      for (let i = i0 - reach; i <= i0 + reach; i += whole || reach === 0 ? 1 : 2 * reach)
        if (i >= 0 && i < nx && surface[j * nx + i] > level) return j * nx + i;
    }
  }
  return -1;
}
