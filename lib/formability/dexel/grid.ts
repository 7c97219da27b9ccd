/** A square-celled grid over the plan, in the mesh's recentred frame. */
export interface Grid {
  cell: number;
  nx: number;
  ny: number;
  /** Corner of cell 0,0. */
  x0: number;
  y0: number;
}

/** Most cells along one side (engine contract: at most 1024² cells). */
export const MOST_CELLS = 1024;
/** Cells along the longer side where the recipe gives no size. */
const USUAL_CELLS = 800;
/** The origin sits off the box by an irrational-looking share of a cell, so walls miss cell centres. */
const SHIFT: [number, number] = [0.137, 0.071];

/**
 * A grid that covers the box.
 * @param cellMm wanted cell, or null; enlarged where it would need more than 1024 cells a side
 */
export function makeGrid(min: readonly number[], max: readonly number[], cellMm: number | null): Grid {
  const width = Math.max(max[0] - min[0], max[1] - min[1], 1e-6);
  const least = width / (MOST_CELLS - 1);
  const cell = cellMm === null ? width / USUAL_CELLS : Math.max(cellMm, least);
  const x0 = min[0] - SHIFT[0] * cell;
  const y0 = min[1] - SHIFT[1] * cell;
  const count = (from: number, to: number) =>
    Math.min(MOST_CELLS, Math.max(1, Math.ceil((to - from) / cell - 1e-9)));
  return { cell, nx: count(x0, max[0]), ny: count(y0, max[1]), x0, y0 };
}

/** Cell number of a point, or −1 outside. */
export function cellAt(grid: Grid, x: number, y: number): number {
  const i = Math.floor((x - grid.x0) / grid.cell);
  const j = Math.floor((y - grid.y0) / grid.cell);
  return i < 0 || j < 0 || i >= grid.nx || j >= grid.ny ? -1 : j * grid.nx + i;
}

export function centreX(grid: Grid, cell: number): number {
  return grid.x0 + ((cell % grid.nx) + 0.5) * grid.cell;
}

export function centreY(grid: Grid, cell: number): number {
  return grid.y0 + (Math.floor(cell / grid.nx) + 0.5) * grid.cell;
}
