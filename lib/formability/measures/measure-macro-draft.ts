import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { DraftRegion } from '../report';
import { CellTable } from './cell-table';
import { sumCells, type CellSums } from './sum-cells';
import { DEG } from './thresholds';

/** Steepest macroscopic slope that still counts as a wall, on either side of upright. */
const WALL_DEG = 45;
/** A cell that alone leans by more than 70° is no part of a wall of 45°. */
const STEEPEST = Math.tan((70 * Math.PI) / 180);
/** Share of the walls' area that may lie below the figure: one patch cut in mid-step is not the wall. */
const SHARE = 0.02;
/** A patch cut off by the bed is left out where one above it reads nearly the same. */
const SAME_DEG = 1.5;
/** A window reaches so many cells up and down from its own: two, with the linear share between cells. */
const REACH_CELLS = 2;

/** The walls at scales above 1 mm, patch by patch. */
export interface MacroWalls {
  /** Draft that 2 % of the walls' area lie below; null without walls. */
  minDeg: number | null;
  patches: { at: [number, number, number]; cell: [number, number, number]; deg: number; areaMm2: number }[];
}

/**
 * Draft of the walls at scales above 1 mm. The sum of area vectors over a patch of surface depends only on the
 * patch's rim, so a stair or a noisy scan sums to the plane behind it (divergence theorem). Patches are cubes of
 * 3 × 3 × 3 cells that overlap, weighed linearly in height. A patch that also holds part of a top reads too high, never
 * too low; one cut off by the bed reads low by half a layer, so such count only where a wall has no others.
 * @param skip facets left out (bed, bores, cavities)
 */
export function measureMacroDraft(mesh: Mesh, facets: Facets, skip: Uint8Array, size: number): MacroWalls {
  const cell = Math.max(2, size / 150);
  const sums = sumCells(mesh, facets, skip, cell);
  const whole: MacroWalls['patches'] = [];
  const cut: MacroWalls['patches'] = [];
  const across = new Float64Array(sums.count);
  for (let c = 0; c < sums.count; c++) across[c] = Math.hypot(sums.x[c], sums.y[c]);
  const rough = new Float64Array(27);
  for (let c = 0; c < sums.count; c++) {
    // A cell of little but tops cannot come out as a wall.
    if (Math.abs(sums.z[c]) > STEEPEST * across[c]) continue;
    const deg = windowDraft(sums, across, c, rough);
    if (Math.abs(deg) >= WALL_DEG) continue;
    const own: [number, number, number] = [sums.i[c], sums.j[c], sums.k[c]];
    const at: [number, number, number] = [
      (own[0] + 0.5) * cell,
      (own[1] + 0.5) * cell,
      (own[2] + 0.5) * cell,
    ];
    (own[2] < REACH_CELLS ? cut : whole).push({ at, cell: own, deg, areaMm2: across[c] });
  }
  const patches = whole.length > 0 ? [...whole, ...onlyCut(whole, cut)] : cut;
  return { minDeg: quantile(patches, SHARE), patches };
}

/** @param rough room for 27 numbers */
function windowDraft(sums: CellSums, across: Float64Array, c: number, rough: Float64Array): number {
  const { table, x, y, z, level } = sums;
  const [i, j, k] = [sums.i[c] - 1, sums.j[c] - 1, sums.k[c] - 1];
  let sumLevel = 0;
  let sumZ = 0;
  let many = 0;
  for (let dk = 0; dk < 3; dk++) {
    for (let dj = 0; dj < 3; dj++) {
      for (let di = 0; di < 3; di++) {
        const near = table.get(i + di, j + dj, k + dk);
        // Opposite walls of a rib share a window; only what faces the same way in plan, or straight up, belongs.
        if (near < 0 || x[near] * x[c] + y[near] * y[c] < 0) continue;
        sumLevel += level[near];
        sumZ += z[near];
        if (across[near] > 0) {
          const own = level[near] / across[near];
          let at = many++;
          for (; at > 0 && rough[at - 1] > own; at--) rough[at] = rough[at - 1];
          rough[at] = own;
        }
      }
    }
  }
  // By length, where two walls meet in a corner each keeps its own draft; what noise adds to the length is taken out
  // again by how rough the calmer quarter of the cells is.
  return Math.atan2(sumZ, sumLevel / (many > 0 ? rough[many >> 2] : 1)) * DEG;
}

/** Patches at the bed for which no whole patch above speaks: walls lower than a window, and feet of another slope. */
function onlyCut(whole: MacroWalls['patches'], cut: MacroWalls['patches']): MacroWalls['patches'] {
  const above = new Map<number, number[]>();
  for (const { cell, deg } of whole) {
    if (cell[2] > 2 * REACH_CELLS) continue;
    for (let n = 0; n < 9; n++) {
      const key = keyOf(cell[0] - 1 + (n % 3), cell[1] - 1 + Math.floor(n / 3));
      const known = above.get(key);
      if (known) known.push(deg);
      else above.set(key, [deg]);
    }
  }
  return cut.filter(
    ({ cell, deg }) => !above.get(keyOf(cell[0], cell[1]))?.some((whole) => Math.abs(whole - deg) < SAME_DEG),
  );
}

function keyOf(i: number, j: number): number {
  return (i + 32_768) * 65_536 + (j + 32_768);
}

function quantile(patches: MacroWalls['patches'], share: number): number | null {
  const total = patches.reduce((area, patch) => area + patch.areaMm2, 0);
  let below = 0;
  for (const { deg, areaMm2 } of [...patches].sort((a, b) => a.deg - b.deg)) {
    below += areaMm2;
    if (below >= share * total) return deg;
  }
  return null;
}

/** Connected patches below a limit, the largest first; the place is where the wall is steepest. */
export function macroRegions(
  { patches }: MacroWalls,
  belowDeg: number,
  leastAreaMm2: number,
  most: number,
): DraftRegion[] {
  const low = patches.filter(({ deg }) => deg < belowDeg);
  const table = new CellTable();
  low.forEach(({ cell: [i, j, k] }, own) => table.find(i, j, k, own));
  const taken = new Uint8Array(low.length);
  const regions: DraftRegion[] = [];
  for (let first = 0; first < low.length; first++) {
    if (taken[first]) continue;
    taken[first] = 1;
    const queue = [first];
    let steepest = low[first];
    let areaMm2 = 0;
    for (const own of queue) {
      const patch = low[own];
      areaMm2 += patch.areaMm2;
      if (patch.deg < steepest.deg) steepest = patch;
      const [i, j, k] = patch.cell;
      for (let n = 0; n < 27; n++) {
        const found = table.get(i - 1 + (n % 3), j - 1 + (((n / 3) | 0) % 3), k - 1 + ((n / 9) | 0));
        if (found < 0 || taken[found]) continue;
        taken[found] = 1;
        queue.push(found);
      }
    }
    if (areaMm2 >= leastAreaMm2) regions.push({ at: steepest.at, areaMm2, minDeg: steepest.deg });
  }
  return regions.sort((a, b) => b.areaMm2 - a.areaMm2).slice(0, most);
}
