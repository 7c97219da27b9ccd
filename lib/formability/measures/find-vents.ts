import type { Columns } from '../dexel/columns';
import { centreX, centreY } from '../dexel/grid';
import type { Edges } from '../mesh/build-edges';
import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { HoleModel } from '../recipe';
import type { Vent } from '../report';
import { findBores, VENT_MM, type Bore } from './find-bores';
import { windowColumns } from './refine-depth';

export interface Vents {
  /** In the mesh's frame. */
  vents: Vent[];
  /** 1 for facets that line a bore. */
  bore: Uint8Array;
  boreAreaMm2: number;
  /** H with every vent closed at its floor. */
  surface: Float64Array;
}

/** Least opening that counts against this hole model, with room for the rounding of float32 corners. */
const ROUNDING_MM = 1e-3;
/** Cells of the fine window on a hole that the mesh walk did not name. */
const FINE_MM = 0.05;
const MOST_WINDOWS = 64;

/** What a printer leaves of a hole: slope × nominal + offset (least squares over coupon holes, NIST e-Handbook §4.1). */
export function printedDiameter(nominal: number, model: HoleModel): number {
  return model.slope * nominal + model.offsetMm;
}

export function isPrintable(nominal: number, model: HoleModel): boolean {
  return printedDiameter(nominal, model) >= model.minOpenMm - ROUNDING_MM;
}

/**
 * Vents: bores found on the mesh, from the bed or a ceiling over it up, and narrow columns without any solid that those
 * do not explain (damaged meshes, slots), measured again on a fine window.
 */
export function findVents(
  mesh: Mesh,
  facets: Facets,
  edges: Edges,
  columns: Columns,
  ofShell: Uint32Array,
  model: HoleModel,
): Vents {
  const bores = findBores(mesh, facets, edges, columns);
  const surface = columns.height.slice();
  const bore = new Uint8Array(mesh.triangles);
  for (const found of bores) {
    for (const facet of found.facets) bore[facet] = 1;
    closeHole(columns, surface, found.x, found.y, found.diameter / 2, found.top);
  }
  const holes = findHoles(mesh, columns, surface, ofShell);
  const all = [...bores, ...holes];
  return {
    vents: all.map((found) => ({
      at: [found.x, found.y, found.top],
      diameterMm: found.diameter,
      lengthMm: found.top,
      printable: isPrintable(found.diameter, model),
      printedMm: Math.max(0, printedDiameter(found.diameter, model)),
    })),
    bore,
    boreAreaMm2: all.reduce((sum, found) => sum + found.area, 0),
    surface,
  };
}

function closeHole(
  columns: Columns,
  surface: Float64Array,
  x: number,
  y: number,
  radius: number,
  floor: number,
): void {
  const { grid } = columns;
  const reach = radius + grid.cell;
  const clamp = (value: number, most: number) => Math.min(most - 1, Math.max(0, Math.floor(value)));
  const [i0, i1] = [
    clamp((x - reach - grid.x0) / grid.cell, grid.nx),
    clamp((x + reach - grid.x0) / grid.cell, grid.nx),
  ];
  const [j0, j1] = [
    clamp((y - reach - grid.y0) / grid.cell, grid.ny),
    clamp((y + reach - grid.y0) / grid.cell, grid.ny),
  ];
  for (let j = j0; j <= j1; j++) {
    for (let i = i0; i <= i1; i++) {
      const c = j * grid.nx + i;
      if (Math.hypot(centreX(grid, c) - x, centreY(grid, c) - y) > reach) continue;
      if (surface[c] < floor) surface[c] = floor;
    }
  }
}

/** Enclosed groups of empty columns as narrow as a vent. */
function findHoles(mesh: Mesh, columns: Columns, surface: Float64Array, ofShell: Uint32Array): Bore[] {
  const { grid } = columns;
  const { nx, ny, cell } = grid;
  const most = (Math.PI / 4) * (VENT_MM + 2 * cell) ** 2;
  const seen = new Uint8Array(nx * ny);
  const holes: Bore[] = [];
  for (let c = 0; c < nx * ny; c++) {
    if (seen[c] || surface[c] > 0) continue;
    const group = [c];
    seen[c] = 1;
    let rim = false;
    let floor = Infinity;
    for (let at = 0; at < group.length; at++) {
      const here = group[at];
      const i = here % nx;
      const j = (here - i) / nx;
      if (i === 0 || j === 0 || i === nx - 1 || j === ny - 1) {
        rim = true;
        continue;
      }
      for (let dy = -nx; dy <= nx; dy += nx) {
        for (let dx = -1; dx <= 1; dx++) {
          const n = here + dy + dx;
          if (surface[n] > 0) floor = Math.min(floor, surface[n]);
          else if (!seen[n]) {
            seen[n] = 1;
            group.push(n);
          }
        }
      }
    }
    if (rim || group.length * cell * cell > most || holes.length >= MOST_WINDOWS) continue;
    const hole = measureHole(mesh, columns, group, floor, ofShell);
    if (hole.diameter > VENT_MM) continue;
    for (const n of group) surface[n] = floor;
    holes.push(hole);
  }
  return holes;
}

function measureHole(
  mesh: Mesh,
  columns: Columns,
  group: number[],
  floor: number,
  ofShell: Uint32Array,
): Bore {
  const { grid } = columns;
  const x = group.reduce((sum, c) => sum + centreX(grid, c), 0) / group.length;
  const y = group.reduce((sum, c) => sum + centreY(grid, c), 0) / group.length;
  const reach =
    Math.max(...group.map((c) => Math.hypot(centreX(grid, c) - x, centreY(grid, c) - y))) + 2 * grid.cell;
  const fine = windowColumns(mesh, x, y, reach, Math.ceil((2 * reach) / FINE_MM), ofShell);
  let cells = 0;
  for (let c = 0; c < fine.count.length; c++) if (fine.count[c] === 0) cells++;
  const area = cells * fine.grid.cell ** 2;
  return { x, y, top: floor, diameter: Math.sqrt((4 * area) / Math.PI), area, facets: [], through: true };
}
