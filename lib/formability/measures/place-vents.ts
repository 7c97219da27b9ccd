import { centreX, centreY, type Grid } from '../dexel/grid';

/** Cells this little above the pit's lowest point belong to its floor, mm. */
const FLOOR_MM = 0.2;
/** A bore keeps this far from the wall, mm: two printed lines (common practice, no source). */
const INSET_MM = 1;

/**
 * Places to drill in a pit's floor. One goes to the lowest point; more go where air is caught last: the floor's far
 * corners, each as far as may be from those before it, clear of the walls where the floor is wide enough.
 * @param floor a cell of the floor
 * @param rimMm level at which the pit overflows
 * @returns points x, y, z in the frame of the grid, at most `wanted`
 */
export function placeVents(
  surface: Float64Array,
  grid: Grid,
  floor: number,
  rimMm: number,
  wanted: number,
): [number, number, number][] {
  const cells = floorCells(surface, grid, floor, rimMm);
  const point = (c: number): [number, number, number] => [centreX(grid, c), centreY(grid, c), surface[c]];
  if (wanted <= 1) return wanted < 1 ? [] : [point(floor)];
  const inner = insetCells(cells, grid, Math.max(1, Math.round(INSET_MM / grid.cell)));
  const away = new Float64Array(inner.length).fill(Infinity);
  const chosen: number[] = [];
  let next = farthestFrom(inner, grid, floor);
  const reach = next < 0 ? 1 : Math.sqrt(squared(grid, inner[next], floor)) || 1;
  while (chosen.length < wanted && next >= 0) {
    chosen.push(inner[next]);
    let farthest = -1;
    let most = 0;
    for (let k = 0; k < inner.length; k++) {
      away[k] = Math.min(away[k], squared(grid, inner[k], inner[next]));
      // Corners before the middle: the sheet lies down there last.
      const score = Math.sqrt(away[k]) * (0.5 + Math.sqrt(squared(grid, inner[k], floor)) / reach);
      if (score > most) {
        most = score;
        farthest = k;
      }
    }
    next = farthest;
  }
  return chosen.map(point);
}

function floorCells(surface: Float64Array, grid: Grid, first: number, rim: number): number[] {
  const { nx, ny } = grid;
  const high = Math.min(surface[first] + FLOOR_MM, rim);
  const seen = new Set([first]);
  const cells = [first];
  for (let at = 0; at < cells.length; at++) {
    const c = cells[at];
    const i = c % nx;
    for (const n of [i > 0 ? c - 1 : -1, i + 1 < nx ? c + 1 : -1, c - nx, c + nx]) {
      if (n < 0 || n >= nx * ny || seen.has(n) || surface[n] > high) continue;
      seen.add(n);
      cells.push(n);
    }
  }
  return cells;
}

/** Cells whose square neighbourhood of `reach` lies in the floor; the innermost there are where the floor is narrow. */
function insetCells(cells: number[], grid: Grid, reach: number): number[] {
  let inside = new Set(cells);
  for (let step = 0; step < reach; step++) {
    const smaller = new Set<number>();
    for (const c of inside) {
      let whole = true;
      for (let dy = -1; dy <= 1 && whole; dy++)
        for (let dx = -1; dx <= 1 && whole; dx++) whole = inside.has(c + dy * grid.nx + dx);
      if (whole) smaller.add(c);
    }
    if (smaller.size === 0) break;
    inside = smaller;
  }
  return [...inside].sort((a, b) => a - b);
}

function squared({ nx }: Grid, a: number, b: number): number {
  const dx = (a % nx) - (b % nx);
  const dy = Math.floor(a / nx) - Math.floor(b / nx);
  return dx * dx + dy * dy;
}

function farthestFrom(cells: number[], grid: Grid, from: number): number {
  let farthest = -1;
  let most = -1;
  cells.forEach((c, k) => {
    const far = squared(grid, c, from);
    if (far > most) {
      most = far;
      farthest = k;
    }
  });
  return farthest;
}
