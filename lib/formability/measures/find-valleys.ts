import type { Grid } from '../dexel/grid';

const HEIGHTS = 1 << 15;
/** Valleys that differ by less, mm, have one floor. */
const SAME_MM = 0.1;

/**
 * Floors between neighbours: levels at which, going down, two bodies that both stand higher by `least` first meet. Found
 * by joining cells from the highest down (each on a block of 2 × 2, as low as its lowest, so a narrow gap stays open).
 * @returns 0 (the bed) and further levels, the deepest valleys first
 */
export function findValleys(surface: Float64Array, grid: Grid, least: number, most: number): number[] {
  const nx = (grid.nx + 1) >> 1;
  const ny = (grid.ny + 1) >> 1;
  const low = new Float64Array(nx * ny).fill(Infinity);
  for (let j = 0; j < grid.ny; j++) {
    for (let i = 0; i < grid.nx; i++) {
      const c = (j >> 1) * nx + (i >> 1);
      const h = surface[j * grid.nx + i];
      if (h < low[c]) low[c] = h;
    }
  }
  const order = fromTheTop(low);
  const parent = new Int32Array(nx * ny).fill(-1);
  const top = new Float64Array(nx * ny);
  const find = (c: number) => {
    while (parent[c] !== c) c = parent[c] = parent[parent[c]];
    return c;
  };
  const floors: { at: number; depth: number }[] = [];
  for (const c of order) {
    const here = low[c];
    if (here <= 0) break;
    parent[c] = c;
    top[c] = here;
    const i = c % nx;
    for (let dy = c >= nx ? -nx : 0; dy <= (c < nx * (ny - 1) ? nx : 0); dy += nx) {
      for (let dx = i > 0 ? -1 : 0; dx <= (i + 1 < nx ? 1 : 0); dx++) {
        if (parent[c + dy + dx] < 0) continue;
        const a = find(c);
        const b = find(c + dy + dx);
        if (a === b) continue;
        const depth = Math.min(top[a], top[b]) - here;
        if (depth >= least) {
          const known = floors.find((floor) => Math.abs(floor.at - here) < SAME_MM);
          if (!known) floors.push({ at: here, depth });
          else if (depth > known.depth) known.depth = depth;
        }
        const [high, other] = top[a] >= top[b] ? [a, b] : [b, a];
        parent[other] = high;
      }
    }
  }
  floors.sort((p, q) => q.depth - p.depth);
  return [0, ...floors.slice(0, most - 1).map(({ at }) => at)];
}

/** Cells from the highest down, by a counting sort of their heights. */
function fromTheTop(height: Float64Array): Int32Array {
  let highest = 0;
  for (const h of height) if (h > highest) highest = h;
  const scale = highest > 0 ? (HEIGHTS - 1) / highest : 0;
  const start = new Uint32Array(HEIGHTS + 1);
  for (const h of height) start[HEIGHTS - ((h * scale) | 0)]++;
  for (let b = 1; b <= HEIGHTS; b++) start[b] += start[b - 1];
  const order = new Int32Array(height.length);
  for (let c = height.length - 1; c >= 0; c--) order[--start[HEIGHTS - ((height[c] * scale) | 0)]] = c;
  return order;
}
