import { addForces, listActive } from './add-forces';
import type { Membrane } from './membrane';
import { cycle, fixNode, makeMultigrid, type Multigrid } from './multigrid';
import { heightAt, meetAt, type Obstacle } from './obstacle';

/**
 * Heavy ball with one multigrid cycle as preconditioner. Step 0.45 with momentum 0.35 stalls at a residual of 1e-3 in
 * nearly flat states, where the tangent is four times the preconditioner.
 */
const STEP = 0.3;
const MOMENTUM = 0.5;
/** Longest move of a node in one iteration, in cells of the sheet. */
const LONGEST_MOVE = 0.5;
/** A node this near to the template touches it, in cells of the sheet. */
const TOUCH = 1e-4;
/** Elements folded under by more than this carry no pressure onto a template: they would balloon without limit. */
const FOLDED = 0.3;

/** One forming run; all its arrays are made once, so that runs side by side share nothing. */
export interface Run {
  sheet: Membrane;
  /** null: nothing to meet (free inflation). */
  template: Obstacle | null;
  grid: Multigrid;
  velocity: Float64Array;
  active: Int32Array;
  activeCount: number;
  /** Nodes that are still free. */
  freeCount: number;
  iterations: number;
  /** Greatest force on a free node at the last iteration, in μ t0 × cell. */
  residual: number;
}

export function makeRun(sheet: Membrane, template: Obstacle | null): Run {
  const active = new Int32Array(sheet.elements);
  let freeCount = 0;
  for (let n = 0; n < sheet.nodes; n++) freeCount += sheet.free[n];
  return {
    sheet,
    template,
    grid: makeMultigrid(sheet),
    velocity: new Float64Array(3 * sheet.nodes),
    active,
    activeCount: listActive(sheet, active),
    freeCount,
    iterations: 0,
    residual: 0,
  };
}

/** One iteration: forces, preconditioned step, and every node that meets the template stays where it met it. */
export function iterate(run: Run, pressure: number): void {
  const { sheet, grid } = run;
  addForces(sheet, run.active, run.activeCount, pressure, run.template ? FOLDED : 1, grid.levels[0].b);
  cycle(grid);
  run.residual = greatestForce(run) / sheet.cell;
  move(run, STEP, MOMENTUM);
  run.iterations++;
}

/** Lets the free sheet follow a frame that has moved by dz, as a stretched film would, then looks for contact. */
export function follow(run: Run, dz: number): void {
  const { grid, sheet } = run;
  const { nx, ny } = sheet;
  const { b } = grid.levels[0];
  b.fill(0);
  for (let i = 1; i < nx; i++) {
    b[3 * (nx + 1 + i) + 2] += grid.weightY * dz;
    b[3 * ((ny - 1) * (nx + 1) + i) + 2] += grid.weightY * dz;
  }
  for (let j = 1; j < ny; j++) {
    b[3 * (j * (nx + 1) + 1) + 2] += grid.weightX * dz;
    b[3 * (j * (nx + 1) + nx - 1) + 2] += grid.weightX * dz;
  }
  cycle(grid);
  run.velocity.fill(0);
  move(run, 1, 0);
  run.velocity.fill(0);
}

/** Fixes free nodes that lie on the template already or within `near` cells of it, where they are. */
export function stickTouching(run: Run, near: number): void {
  const { sheet, template } = run;
  if (!template) return;
  for (let n = 0; n < sheet.nodes; n++) {
    if (!sheet.free[n]) continue;
    const h = heightAt(template, sheet.at[3 * n], sheet.at[3 * n + 1]);
    if (sheet.at[3 * n + 2] - h > near * sheet.cell) continue;
    stick(run, n);
  }
  run.activeCount = listActive(sheet, run.active);
}

export function stick(run: Run, node: number): void {
  fixNode(run.grid, node);
  run.velocity.fill(0, 3 * node, 3 * node + 3);
  run.freeCount--;
}

function greatestForce({ sheet, grid }: Run): number {
  const { b } = grid.levels[0];
  let greatest = 0;
  for (let n = 0, k = 0; n < sheet.nodes; n++, k += 3) {
    if (sheet.free[n] === 0) continue;
    const squared = b[k] * b[k] + b[k + 1] * b[k + 1] + b[k + 2] * b[k + 2];
    if (squared > greatest) greatest = squared;
  }
  return Math.sqrt(greatest);
}

function move(run: Run, step: number, momentum: number): void {
  const { sheet, template, velocity } = run;
  const { at, free } = sheet;
  const { u } = run.grid.levels[0];
  const longest = LONGEST_MOVE * sheet.cell;
  const touch = TOUCH * sheet.cell;
  const before = run.freeCount;
  for (let n = 0, k = 0; n < sheet.nodes; n++, k += 3) {
    if (free[n] === 0) continue;
    let dx = momentum * velocity[k] + step * u[k];
    let dy = momentum * velocity[k + 1] + step * u[k + 1];
    let dz = momentum * velocity[k + 2] + step * u[k + 2];
    const length = Math.sqrt(dx * dx + dy * dy + dz * dz);
    if (length > longest) {
      const share = longest / length;
      dx *= share;
      dy *= share;
      dz *= share;
    }
    velocity[k] = dx;
    velocity[k + 1] = dy;
    velocity[k + 2] = dz;
    if (template === null || at[k + 2] + dz - heightAt(template, at[k] + dx, at[k + 1] + dy) > touch) {
      at[k] += dx;
      at[k + 1] += dy;
      at[k + 2] += dz;
      continue;
    }
    const share = meetAt(template, at[k], at[k + 1], at[k + 2], dx, dy, dz);
    at[k] += share * dx;
    at[k + 1] += share * dy;
    at[k + 2] += share * dz;
    stick(run, n);
  }
  if (run.freeCount !== before) run.activeCount = listActive(sheet, run.active);
}
