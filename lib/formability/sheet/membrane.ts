/**
 * A sheet as triangles with linear displacement on a logical grid of nx × ny cells, each cut by a diagonal that
 * alternates like a chess board, so that a mirrored part gives a mirrored sheet. Node (i, j) is j (nx + 1) + i.
 * Stiffness μ t0 is 1 throughout: forces are in units of μ t0 mm, pressures in μ t0 / mm.
 */
export interface Membrane {
  nx: number;
  ny: number;
  nodes: number;
  elements: number;
  /** Positions before forming, in the sheet's plane, mm. */
  restX: Float64Array;
  restY: Float64Array;
  /** x, y, z of each node as formed, mm. */
  at: Float64Array;
  /** 1 while a node is neither clamped nor stuck. */
  free: Uint8Array;
  /** Three nodes of each element, anticlockwise seen from above. */
  corners: Int32Array;
  /** Inverse of the matrix of rest edges (1/mm), row by row, four an element. */
  inverse: Float64Array;
  restArea: Float64Array;
  /** Cell sides of the grid, mm (nominal, where a map distorts it), and the lesser of the two. */
  cellX: number;
  cellY: number;
  cell: number;
}

/** A rectangle, clamped along its sides, level at z. */
export function makeRectangle(
  centre: readonly [number, number],
  size: readonly [number, number],
  cells: readonly [number, number],
  z: number,
): Membrane {
  const [nx, ny] = cells;
  const place = (i: number, j: number): [number, number] => [
    centre[0] + size[0] * (i / nx - 0.5),
    centre[1] + size[1] * (j / ny - 0.5),
  ];
  return makeSheet(nx, ny, size[0] / nx, size[1] / ny, place, z);
}

/** Cells of any shape: `place` says where node (i, j) lies, level at z; the rim is clamped. */
export function makeSheet(
  nx: number,
  ny: number,
  cellX: number,
  cellY: number,
  place: (i: number, j: number) => [number, number],
  z: number,
): Membrane {
  const nodes = (nx + 1) * (ny + 1);
  const elements = 2 * nx * ny;
  const sheet: Membrane = {
    nx,
    ny,
    nodes,
    elements,
    restX: new Float64Array(nodes),
    restY: new Float64Array(nodes),
    at: new Float64Array(3 * nodes),
    free: new Uint8Array(nodes),
    corners: new Int32Array(3 * elements),
    inverse: new Float64Array(4 * elements),
    restArea: new Float64Array(elements),
    cellX,
    cellY,
    cell: Math.min(cellX, cellY),
  };
  for (let j = 0, n = 0; j <= ny; j++) {
    for (let i = 0; i <= nx; i++, n++) {
      const [x, y] = place(i, j);
      sheet.restX[n] = sheet.at[3 * n] = x;
      sheet.restY[n] = sheet.at[3 * n + 1] = y;
      sheet.at[3 * n + 2] = z;
      sheet.free[n] = i > 0 && j > 0 && i < nx && j < ny ? 1 : 0;
    }
  }
  for (let j = 0, e = 0; j < ny; j++) {
    for (let i = 0; i < nx; i++, e += 2) {
      const a = j * (nx + 1) + i;
      const b = a + 1;
      const d = a + nx + 1;
      const c = d + 1;
      const [first, second] = (i + j) & 1 ? [[a, b, d], [c, d, b]] : [[b, c, a], [d, a, c]]; // prettier-ignore
      sheet.corners.set(first, 3 * e);
      sheet.corners.set(second, 3 * e + 3);
    }
  }
  measureRest(sheet);
  return sheet;
}

/** Rest areas and inverse edges from the rest positions. */
export function measureRest(sheet: Membrane): void {
  for (let e = 0; e < sheet.elements; e++) measureElement(sheet, e);
}

function measureElement(sheet: Membrane, e: number): void {
  const { corners, restX, restY, inverse } = sheet;
  const [p, q, r] = [corners[3 * e], corners[3 * e + 1], corners[3 * e + 2]];
  const [qx, qy] = [restX[q] - restX[p], restY[q] - restY[p]];
  const [rx, ry] = [restX[r] - restX[p], restY[r] - restY[p]];
  const twice = qx * ry - rx * qy;
  sheet.restArea[e] = twice / 2;
  inverse[4 * e] = ry / twice;
  inverse[4 * e + 1] = -rx / twice;
  inverse[4 * e + 2] = -qy / twice;
  inverse[4 * e + 3] = qx / twice;
}
