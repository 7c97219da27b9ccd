import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import { DEG } from './thresholds';

/** Steepest macroscopic slope that still counts as a wall. */
const WALL_DEG = 45;
/** A cell that alone leans by more than 70° is no part of a wall of 45°. */
const STEEPEST = Math.tan((70 * Math.PI) / 180);
/** Share of the walls' area that may lie below the figure: one patch cut in mid-step is not the wall. */
const SHARE = 0.02;

/**
 * Draft of the walls at scales above 1 mm. The sum of area vectors over a patch of surface depends only on the
 * patch's rim, so a stair or a noisy scan sums to the plane behind it (divergence theorem). Patches are cubes of
 * 3 × 3 × 3 cells that overlap; a patch that also holds part of a top reads too high, never too low.
 * @param skip facets left out (bed, bores, cavities)
 * @returns the draft that 2 % of the walls' area lie below, or null without walls
 */
export function measureMacroDraft(mesh: Mesh, facets: Facets, skip: Uint8Array, size: number): number | null {
  const cell = Math.max(1.5, size / 150);
  const cells = sumCells(mesh, facets, skip, cell);
  const walls: { draft: number; area: number }[] = [];
  for (const own of cells.values()) {
    // A cell of little but tops cannot come out as a wall.
    if (Math.abs(own.z) > STEEPEST * Math.hypot(own.x, own.y)) continue;
    const sum = [0, 0, 0];
    for (let n = 0; n < 27; n++) {
      const near = cells.get(
        keyOf(own.i - 1 + (n % 3), own.j - 1 + (Math.floor(n / 3) % 3), own.k - 1 + Math.floor(n / 9)),
      );
      if (!near) continue;
      // Opposite walls of a rib share a window; only what faces the same way in plan, or straight up, belongs.
      if (near.x * own.x + near.y * own.y < 0) continue;
      sum[0] += near.x;
      sum[1] += near.y;
      sum[2] += near.z;
    }
    const draft = Math.atan2(sum[2], Math.hypot(sum[0], sum[1])) * DEG;
    if (Math.abs(draft) < WALL_DEG) walls.push({ draft, area: Math.hypot(own.x, own.y) });
  }
  const total = walls.reduce((area, wall) => area + wall.area, 0);
  if (!(total > 0)) return null;
  walls.sort((a, b) => a.draft - b.draft);
  let below = 0;
  for (const wall of walls) {
    below += wall.area;
    if (below >= SHARE * total) return wall.draft;
  }
  return walls[walls.length - 1].draft;
}

interface Cell {
  i: number;
  j: number;
  k: number;
  x: number;
  y: number;
  z: number;
}

function keyOf(i: number, j: number, k: number): number {
  return ((i + 4096) * 8192 + (j + 4096)) * 8192 + (k + 4096);
}

/**
 * Area vectors per cell; a facet longer than a cell is spread over points on it. In height each point is shared between
 * the two nearest cells by distance, so a step that falls on a cell's rim does not tip the balance.
 */
function sumCells(mesh: Mesh, facets: Facets, skip: Uint8Array, cell: number): Map<number, Cell> {
  const { index, position: p, triangles } = mesh;
  const cells = new Map<number, Cell>();
  const recent: (Cell | undefined)[] = [undefined, undefined];
  const cellAt = (i: number, j: number, k: number): Cell => {
    const last = recent[k & 1];
    if (last && last.i === i && last.j === j && last.k === k) return last;
    const key = keyOf(i, j, k);
    let found = cells.get(key);
    if (!found) cells.set(key, (found = { i, j, k, x: 0, y: 0, z: 0 }));
    recent[k & 1] = found;
    return found;
  };
  for (let t = 0; t < triangles; t++) {
    if (skip[t] || facets.area[t] === 0) continue;
    const a = index[3 * t] * 3;
    const b = index[3 * t + 1] * 3;
    const d = index[3 * t + 2] * 3;
    const ux = p[b] - p[a];
    const uy = p[b + 1] - p[a + 1];
    const uz = p[b + 2] - p[a + 2];
    const vx = p[d] - p[a];
    const vy = p[d + 1] - p[a + 1];
    const vz = p[d + 2] - p[a + 2];
    const reach = Math.max(
      Math.abs(ux),
      Math.abs(uy),
      Math.abs(uz),
      Math.abs(vx),
      Math.abs(vy),
      Math.abs(vz),
    );
    const m = Math.min(256, Math.max(1, Math.ceil((3 * reach) / cell)));
    const share = 1 / (2 * m * m);
    const x = (uy * vz - uz * vy) * share;
    const y = (uz * vx - ux * vz) * share;
    const z = (ux * vy - uy * vx) * share;
    for (let i = 0; i < m; i++) {
      for (let j = 0; j < m - i; j++) {
        for (let half = 0; half < (j < m - i - 1 ? 2 : 1); half++) {
          const s = (i + (1 + half) / 3) / m;
          const r = (j + (1 + half) / 3) / m;
          const height = (p[a + 2] + s * uz + r * vz) / cell - 0.5;
          const ci = Math.floor((p[a] + s * ux + r * vx) / cell);
          const cj = Math.floor((p[a + 1] + s * uy + r * vy) / cell);
          const ck = Math.floor(height);
          const upper = height - ck;
          const low = cellAt(ci, cj, ck);
          low.x += x * (1 - upper);
          low.y += y * (1 - upper);
          low.z += z * (1 - upper);
          const high = cellAt(ci, cj, ck + 1);
          high.x += x * upper;
          high.y += y * upper;
          high.z += z * upper;
        }
      }
    }
  }
  return cells;
}
