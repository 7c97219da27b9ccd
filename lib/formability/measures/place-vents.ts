import { floodFrom } from '../dexel/flood-from';
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

function floorCells(surface: Float64Array, grid: Grid, first: number, rim: number): Int32Array {
  const high = Math.min(surface[first] + FLOOR_MM, rim);
  return floodFrom(grid, first, (c) => !(surface[c] > high)).cells;
}

/** Cells at least `reach` cells inside the floor's rim; the innermost there are where the floor is narrow. */
function insetCells(cells: Int32Array, grid: Grid, reach: number): Int32Array {
  const { nx, ny } = grid;
  // 0 outside the floor, else one more than the steps (8 neighbours) to its rim.
  const depth = new Int32Array(nx * ny);
  for (const c of cells) depth[c] = -1;
  const eachBeside = (c: number, visit: (n: number) => void) => {
    const i = c % nx;
    for (let dy = c >= nx ? -nx : 0; dy <= (c < nx * (ny - 1) ? nx : 0); dy += nx)
      for (let dx = i > 0 ? -1 : 0; dx <= (i + 1 < nx ? 1 : 0); dx++) visit(c + dy + dx);
  };
  const queue = new Int32Array(cells.length);
  let end = 0;
  for (const c of cells) {
    let rim = false;
    eachBeside(c, (n) => {
      if (depth[n] === 0) rim = true;
    });
    if (rim) queue[end++] = c;
  }
  for (let k = 0; k < end; k++) depth[queue[k]] = 1;
  for (let at = 0; at < end; at++) {
    const c = queue[at];
    eachBeside(c, (n) => {
      if (depth[n] >= 0) return;
      depth[n] = depth[c] + 1;
      queue[end++] = n;
    });
  }
  const deepest = end > 0 ? depth[queue[end - 1]] : 1;
  const wanted = Math.min(reach + 1, deepest);
  return cells.filter((c) => depth[c] >= wanted).sort();
}

function squared({ nx }: Grid, a: number, b: number): number {
  const dx = (a % nx) - (b % nx);
  const dy = Math.floor(a / nx) - Math.floor(b / nx);
  return dx * dx + dy * dy;
}

function farthestFrom(cells: Int32Array, grid: Grid, from: number): number {
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
