import type { Membrane } from './membrane';

/** One grid of the hierarchy; vectors have three components a node. */
interface Level {
  nx: number;
  ny: number;
  free: Uint8Array;
  /** Correction, and right-hand side. */
  u: Float64Array;
  b: Float64Array;
}

/**
 * Multigrid for the five-point Laplacian of the logical grid, fixed at nodes that are not free: the preconditioner
 * that makes the number of iterations independent of the mesh, because at large stretch the sheet's tangent
 * stiffness tends to μ t0 times that Laplacian.
 */
export interface Multigrid {
  levels: Level[];
  weightX: number;
  weightY: number;
}

const LEAST_CELLS = 4;
const COARSEST_SWEEPS = 8;

/** Levels from the sheet's own grid downwards; the finest shares `free` with the sheet. */
export function makeMultigrid(sheet: Membrane): Multigrid {
  const levels: Level[] = [level(sheet.nx, sheet.ny, sheet.free)];
  for (;;) {
    const { nx, ny, free } = levels[levels.length - 1];
    if (nx % 2 || ny % 2 || Math.min(nx, ny) < 2 * LEAST_CELLS) break;
    levels.push(level(nx / 2, ny / 2, coarseFree(nx, ny, free)));
  }
  return { levels, weightX: sheet.cellY / sheet.cellX, weightY: sheet.cellX / sheet.cellY };
}

function level(nx: number, ny: number, free: Uint8Array): Level {
  const size = 3 * (nx + 1) * (ny + 1);
  return { nx, ny, free, u: new Float64Array(size), b: new Float64Array(size) };
}

/** A coarse node is free only if all nine fine nodes at and around it are: less makes the correction blow up. */
function coarseFree(nx: number, ny: number, fine: Uint8Array): Uint8Array {
  const free = new Uint8Array((nx / 2 + 1) * (ny / 2 + 1));
  for (let j = 2; j < ny; j += 2) {
    for (let i = 2; i < nx; i += 2) {
      let all = 1;
      for (let dj = -1; dj <= 1; dj++) {
        for (let di = -1; di <= 1; di++) all &= fine[(j + dj) * (nx + 1) + i + di];
      }
      free[(j / 2) * (nx / 2 + 1) + i / 2] = all;
    }
  }
  return free;
}

/** Fixes a node of the finest grid and every coarse node that leans on it. */
export function fixNode(grid: Multigrid, node: number): void {
  const width = grid.levels[0].nx + 1;
  fixAt(grid.levels, 0, node % width, Math.floor(node / width));
}

function fixAt(levels: Level[], depth: number, i: number, j: number): void {
  const { nx, free, u } = levels[depth];
  const node = j * (nx + 1) + i;
  free[node] = 0;
  u[3 * node] = u[3 * node + 1] = u[3 * node + 2] = 0;
  if (depth + 1 >= levels.length) return;
  const coarse = levels[depth + 1];
  for (let cj = (j - 1 + (j & 1 ? 0 : 1)) >> 1; cj <= (j + 1) >> 1; cj++) {
    for (let ci = (i - 1 + (i & 1 ? 0 : 1)) >> 1; ci <= (i + 1) >> 1; ci++) {
      if (ci < 0 || cj < 0 || ci > coarse.nx || cj > coarse.ny) continue;
      if (coarse.free[cj * (coarse.nx + 1) + ci]) fixAt(levels, depth + 1, ci, cj);
    }
  }
}

/**
 * One V(1,1) cycle from zero, red before black downwards and black before red upwards. The right-hand side is in
 * `levels[0].b`, the result in `levels[0].u`, zero at fixed nodes.
 */
export function cycle(grid: Multigrid): void {
  const { levels, weightX, weightY } = grid;
  const last = levels.length - 1;
  for (let depth = 0; depth < last; depth++) {
    const fine = levels[depth];
    firstRed(fine, weightX, weightY);
    sweep(fine, 1, weightX, weightY);
    restrict(fine, levels[depth + 1], weightX, weightY);
  }
  firstRed(levels[last], weightX, weightY);
  sweep(levels[last], 1, weightX, weightY);
  for (let k = 0; k < COARSEST_SWEEPS; k++) {
    sweep(levels[last], 0, weightX, weightY);
    sweep(levels[last], 1, weightX, weightY);
  }
  for (let k = 0; k <= COARSEST_SWEEPS; k++) {
    sweep(levels[last], 1, weightX, weightY);
    sweep(levels[last], 0, weightX, weightY);
  }
  for (let depth = last - 1; depth >= 0; depth--) {
    addCoarse(levels[depth], levels[depth + 1]);
    sweep(levels[depth], 1, weightX, weightY);
    sweep(levels[depth], 0, weightX, weightY);
  }
}

/** Red nodes (i + j even) from a start of zero. */
function firstRed({ nx, ny, free, u, b }: Level, wx: number, wy: number): void {
  const share = 1 / (2 * (wx + wy));
  u.fill(0);
  for (let j = 1; j < ny; j++) {
    const row = j * (nx + 1);
    for (let n = row + 1 + ((j + 1) & 1), end = row + nx; n < end; n += 2) {
      if (free[n] === 0) continue;
      const k = 3 * n;
      u[k] = b[k] * share;
      u[k + 1] = b[k + 1] * share;
      u[k + 2] = b[k + 2] * share;
    }
  }
}

/** Gauss-Seidel over the nodes of one colour: 0 red, 1 black. */
function sweep({ nx, ny, free, u, b }: Level, colour: number, wx: number, wy: number): void {
  const share = 1 / (2 * (wx + wy));
  const up = 3 * (nx + 1);
  for (let j = 1; j < ny; j++) {
    const row = j * (nx + 1);
    for (let n = row + 1 + ((j + 1 + colour) & 1), end = row + nx; n < end; n += 2) {
      if (free[n] === 0) continue;
      const k = 3 * n;
      u[k] = share * (b[k] + wx * (u[k - 3] + u[k + 3]) + wy * (u[k - up] + u[k + up]));
      u[k + 1] = share * (b[k + 1] + wx * (u[k - 2] + u[k + 4]) + wy * (u[k + 1 - up] + u[k + 1 + up]));
      u[k + 2] = share * (b[k + 2] + wx * (u[k - 1] + u[k + 5]) + wy * (u[k + 2 - up] + u[k + 2 + up]));
    }
  }
}

/** Residual to the coarse grid (transpose of bilinear interpolation); black nodes were just solved, so theirs is zero. */
function restrict(fine: Level, coarse: Level, wx: number, wy: number): void {
  const width = fine.nx + 1;
  for (let j = 1; j < coarse.ny; j++) {
    for (let i = 1; i < coarse.nx; i++) {
      const c = j * (coarse.nx + 1) + i;
      if (coarse.free[c] === 0) continue;
      const f = 2 * j * width + 2 * i;
      for (let axis = 0; axis < 3; axis++) {
        const corners =
          residual(fine, f - width - 1, axis, wx, wy) +
          residual(fine, f + width + 1, axis, wx, wy) +
          (residual(fine, f - width + 1, axis, wx, wy) + residual(fine, f + width - 1, axis, wx, wy));
        coarse.b[3 * c + axis] = residual(fine, f, axis, wx, wy) + corners / 4;
      }
    }
  }
}

function residual({ nx, u, b }: Level, n: number, axis: number, wx: number, wy: number): number {
  const k = 3 * n + axis;
  const up = 3 * (nx + 1);
  return b[k] - 2 * (wx + wy) * u[k] + wx * (u[k - 3] + u[k + 3]) + wy * (u[k - up] + u[k + up]);
}

/** Bilinear interpolation onto red nodes only: black ones are solved afresh right after. */
function addCoarse(fine: Level, coarse: Level): void {
  const { nx, ny, free, u } = fine;
  const width = nx + 1;
  const across = coarse.nx + 1;
  const v = coarse.u;
  for (let j = 1; j < ny; j++) {
    const odd = j & 1;
    for (let i = odd ? 1 : 2; i < nx; i += 2) {
      const n = j * width + i;
      if (free[n] === 0) continue;
      const k = 3 * n;
      const c = 3 * ((j >> 1) * across + (i >> 1));
      if (!odd) {
        u[k] += v[c];
        u[k + 1] += v[c + 1];
        u[k + 2] += v[c + 2];
        continue;
      }
      const d = c + 3 * across;
      u[k] += (v[c] + v[d + 3] + (v[c + 3] + v[d])) / 4;
      u[k + 1] += (v[c + 1] + v[d + 4] + (v[c + 4] + v[d + 1])) / 4;
      u[k + 2] += (v[c + 2] + v[d + 5] + (v[c + 5] + v[d + 2])) / 4;
    }
  }
}
