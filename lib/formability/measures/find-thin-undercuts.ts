import { CONNECTED, connectAir, gapFloor } from '../dexel/air';
import { centreX, centreY } from '../dexel/grid';
import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { Point, UndercutRegion } from '../report';
import { spreadDepth, type Undercuts } from './find-undercuts';
import { windowColumns } from './refine-depth';
import { SIN_VERTICAL } from './thresholds';
import type { Visibility } from './visibility';

/** The largest ledges are looked at, each in a window of its own. */
const MOST_WINDOWS = 16;
const REACH_CELLS = 2;
const FINE_MM = 0.02;
const CELLS: [least: number, most: number] = [64, 256];
/** A ledge whose outside is air for this share of it overhangs. */
const OPEN = 0.5;

/**
 * Ledges so narrow that no column of the grid goes through them (ribs of a tenth of a millimetre on a large template):
 * where the grid saw no undercut at all though facets overhang, the largest of these are looked at through fine windows.
 * Adds them to the undercuts as one region, at its deepest place.
 * @param textureMm what is deeper locks the part: its facets are ceilings
 */
export function findThinUndercuts(
  mesh: Mesh,
  facets: Facets,
  visibility: Visibility,
  cell: number,
  ofShell: Uint32Array,
  textureMm: number,
  undercuts: Undercuts,
): void {
  if (undercuts.regions.length > 0) return;
  const ledges: number[] = [];
  for (let t = 0; t < mesh.triangles; t++) {
    const open = visibility.visible[t] + visibility.shadowed[t];
    if (facets.nz[t] < -SIN_VERTICAL && !facets.bed[t] && facets.area[t] > 0 && open > OPEN) ledges.push(t);
  }
  if (ledges.length === 0) return;
  const planAreaMm2 = ledges.reduce((sum, t) => sum - facets.area[t] * facets.nz[t], 0);
  const largest = [...ledges].sort((a, b) => facets.area[b] - facets.area[a] || a - b).slice(0, MOST_WINDOWS);
  const region: UndercutRegion = {
    at: [0, 0, 0],
    planAreaMm2,
    volumeMm3: 0,
    maxDepthMm: 0,
    zMm: [Infinity, -Infinity],
  };
  let [gaps, heights] = [0, 0];
  const reach = REACH_CELLS * cell;
  const cells = Math.min(CELLS[1], Math.max(CELLS[0], Math.ceil((2 * reach) / FINE_MM)));
  for (const t of largest) {
    const [x, y] = middleOf(mesh, t);
    const columns = windowColumns(mesh, x, y, reach, cells, ofShell);
    const air = connectAir(columns, 'unknown');
    const depth = spreadDepth(columns, air, 'unknown');
    for (let c = 0; c < columns.count.length; c++) {
      for (let k = 0, s = columns.start[c]; k < columns.count[c]; k++, s += 2) {
        if (air.state[s] !== CONNECTED || !(depth[s] < Infinity)) continue;
        const floor = gapFloor(columns, c, s);
        gaps++;
        heights += columns.z[s] - floor;
        region.zMm[0] = Math.min(region.zMm[0], floor);
        region.zMm[1] = Math.max(region.zMm[1], columns.z[s]);
        if (depth[s] <= region.maxDepthMm) continue;
        region.maxDepthMm = depth[s];
        const { grid } = columns;
        region.at = [centreX(grid, c), centreY(grid, c), columns.z[s]];
      }
    }
  }
  if (gaps === 0) return;
  region.volumeMm3 = (planAreaMm2 * heights) / gaps;
  undercuts.regions.push(region);
  undercuts.unseenMm3 = region.volumeMm3;
  if (region.maxDepthMm > textureMm) for (const t of ledges) undercuts.ceiling[t] = 1;
}

function middleOf({ index, position: p }: Mesh, t: number): Point {
  const [a, b, d] = [0, 1, 2].map((k) => index[3 * t + k] * 3);
  return [0, 1, 2].map((k) => (p[a + k] + p[b + k] + p[d + k]) / 3) as Point;
}
