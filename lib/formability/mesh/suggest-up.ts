import { connectAir } from '../dexel/air';
import { buildColumns } from '../dexel/columns';
import { makeGrid } from '../dexel/grid';
import { rasterise } from '../dexel/raster';
import type { Point } from '../report';
import { isClosed } from './build-edges';
import { baseOf, findStands, type Stand } from './find-stands';
import type { Facets } from './measure-facets';
import type { Mesh } from './mesh';
import { turnToUp } from './place-mesh';
import type { Prepared } from './prepare-mesh';

/** Undercut below this share of the solid is a matter of design, not of how the part lies. */
const LEAST_UNDERCUT = 0.004;
/** A stand is better when its base is larger by this factor and this share of the undercut remains. */
const LARGER_BASE = 1.005;
const LEFT_OVER = 0.25;
const CELLS = 96;
const MOST_TRIED = 4;
/** A base below this share of the better one is an edge or a point: the part cannot stand so. */
const NO_BASE = 0.002;
/** Walls lean by at most so much, and lean out from so much on. */
const SIN_WALL = Math.sin(Math.PI / 3);
const SIN_OUT = Math.sin((2.5 * Math.PI) / 180);
/** Share of the walls that leans out where a part stands on its head, or lies on a side. */
const ON_HEAD = 0.6;
const ON_SIDE = 0.25;

/**
 * The direction that stands the part on a larger base with far less undercut, in the file's frame; null where the
 * part stands well. Undercut is measured on coarse columns, for every stand alike. A part that stands on its foot and
 * carries a wider head (T, mushroom) is meant so: only one without a base, or whose walls lean out, lies wrong.
 * @param undercutVolume of the part as it stands, mm³
 */
export function suggestUp(prepared: Prepared, undercutVolume: number, solidVolume: number): Point | null {
  if (!(undercutVolume > LEAST_UNDERCUT * solidVolume)) return null;
  const { mesh, facets, turn } = prepared;
  const base = baseOf(mesh, facets, [0, 0, 1]);
  const stands = findStands(mesh, facets).filter((stand) => stand.baseMm2 > LARGER_BASE * base);
  if (stands.length === 0) return null;
  const now = undercutWith(prepared, [0, 0, 1]);
  let best: Stand | null = null;
  let least = LEFT_OVER * now;
  for (const stand of stands.slice(0, MOST_TRIED)) {
    const undercut = undercutWith(prepared, stand.up);
    if (undercut >= least) continue;
    least = undercut;
    best = stand;
  }
  if (best === null) return null;
  const [x, y, z] = best.up;
  if (base > NO_BASE * best.baseMm2 && leaningOut(facets) < (z < -0.9 ? ON_HEAD : ON_SIDE)) return null;
  const inFile = turn ? [0, 1, 2].map((k) => turn[k] * x + turn[3 + k] * y + turn[6 + k] * z) : best.up;
  return inFile.map((value) => Math.round(value * 1e6) / 1e6 || 0) as Point;
}

/** Share of the walls' area that leans out by more than its noise. */
function leaningOut({ area, nz, bed }: Facets): number {
  let [walls, out] = [0, 0];
  for (let t = 0; t < area.length; t++) {
    if (bed[t] || nz[t] > SIN_WALL || nz[t] < -SIN_WALL) continue;
    walls += area[t];
    if (nz[t] < -SIN_OUT) out += area[t];
  }
  return walls > 0 ? out / walls : 0;
}

/** Undercut volume with `up` turned to +Z, by columns of a hundredth of the width. */
function undercutWith({ mesh, edges, shells }: Prepared, up: Point): number {
  const turned = turnMesh(mesh, up);
  const wide = Math.max(turned.high[0] - turned.low[0], turned.high[1] - turned.low[1]);
  const grid = makeGrid(turned.low, turned.high, wide / CELLS);
  const hits = rasterise(turned.mesh, grid, isClosed(edges) ? 0 : 2);
  return connectAir(buildColumns(hits, grid, shells.ofFacet)).undercutVolume;
}

function turnMesh(mesh: Mesh, up: Point): { mesh: Mesh; low: Point; high: Point } {
  const rows = turnToUp(up) ?? [1, 0, 0, 0, 1, 0, 0, 0, 1];
  const position = new Float64Array(mesh.position.length);
  const low: Point = [Infinity, Infinity, Infinity];
  const high: Point = [-Infinity, -Infinity, -Infinity];
  for (let i = 0; i < position.length; i += 3) {
    for (let k = 0; k < 3; k++) {
      const value =
        rows[3 * k] * mesh.position[i] +
        rows[3 * k + 1] * mesh.position[i + 1] +
        rows[3 * k + 2] * mesh.position[i + 2];
      position[i + k] = value;
      if (value < low[k]) low[k] = value;
      if (value > high[k]) high[k] = value;
    }
  }
  for (let i = 2; i < position.length; i += 3) position[i] -= low[2];
  return { mesh: { ...mesh, position }, low, high };
}
