import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { Point } from '../report';
import type { DetailReport } from '../report-walls';
import type { FacetGrid } from './facet-grid';
import { RayCaster } from './ray-caster';
import type { Visibility } from './visibility';

/** Up to so many wall facets are all looked at; of more, so many evenly by number, and as many of the walls' samples. */
const MOST_FACETS = 2_000;
/** Of such fine meshes only what is narrower than this, mm, is followed: no nozzle hangs on more. */
const FINE_MM = 10;
/** Flatter than 60° of draft is a wall. */
const SIN_TOP = Math.sin(Math.PI / 3);
/** Two walls bound a detail where they face each other, or turn their backs, within 31° of parallel. */
const OPPOSITE = Math.cos((31 * Math.PI) / 180);
/** Within 2° of parallel, walls do not run together at an edge nearby. */
const PARALLEL = Math.cos((2 * Math.PI) / 180);
/** A floor or a top: flatter than this; steeper, and the two walls meet in an edge. */
const LEVEL_NZ = 0.5;
/** The narrowest are looked at again near the corners of their facets, where a wall that leans is narrowest. */
const FOLLOWED = 64;
const NEAR = 1e-3;
const AROUND = [[NEAR, NEAR], [1 - 2 * NEAR, NEAR], [NEAR, 1 - 2 * NEAR], [0.5, NEAR], [NEAR, 0.5], [0.5 - NEAR, 0.5 - NEAR]]; // prettier-ignore
const MIDDLE = [1 / 3, 1 / 3];
/** Details beyond this many times the finest found are not followed any more. */
const STILL_FINE = 4;
/** Facets that all rays together look at. */
const MOST_LOOKS = 5e6;

interface Found {
  facet: number;
  mm: number;
}

interface Finest {
  mm: number;
  at: Point;
}

/**
 * The finest detail that the printer must draw, on the mesh itself: the narrowest solid (rib, pin, wall, stroke of a
 * letter) and the narrowest air (slot, groove, gap) between two walls, measured level, as lines are laid, and at its
 * narrowest height. Details that taper to an edge have no least width and are left out; so are vents.
 * @param sampled facets spread evenly over the surface, looked at besides
 */
export function measureDetails(
  mesh: Mesh,
  facets: Facets,
  grid: FacetGrid,
  visibility: Visibility,
  bore: Uint8Array,
  sampled: Int32Array,
): DetailReport {
  const { candidates, longest } = chooseWalls(facets, bore, sampled);
  const caster = new RayCaster(mesh, grid, MOST_LOOKS);
  const solids: Found[] = [];
  const gaps: Found[] = [];
  let [leastSolid, leastGap] = [longest / STILL_FINE, longest / STILL_FINE];
  for (const facet of candidates) {
    const { visible, shadowed, enclosed } = visibility;
    const buried = visible[facet] + shadowed[facet] + enclosed[facet] < 0.5;
    const gap = across(mesh, facets, caster, facet, MIDDLE, 'air', buried ? Infinity : STILL_FINE * leastGap);
    // A ray outward that leaves solid first began inside another body: what lies there is no detail.
    if (buried && caster.exit >= 0 && facing(facets, facet, caster.exit) > 0) continue;
    if (gap > 0 && !tapers(mesh, facets, caster, facet, MIDDLE, gap, 'air')) {
      gaps.push({ facet, mm: gap });
      if (gap < leastGap) leastGap = gap;
    }
    const solid = across(mesh, facets, caster, facet, MIDDLE, 'solid', STILL_FINE * leastSolid);
    if (solid > 0 && !tapers(mesh, facets, caster, facet, MIDDLE, solid, 'solid')) {
      solids.push({ facet, mm: solid });
      if (solid < leastSolid) leastSolid = solid;
    }
  }
  const solid = narrowest(mesh, facets, caster, solids, 'solid');
  const gap = narrowest(mesh, facets, caster, gaps, 'air');
  return {
    smallestFeatureMm: solid?.mm ?? null,
    smallestFeatureAt: solid?.at ?? null,
    smallestGapMm: gap?.mm ?? null,
    smallestGapAt: gap?.at ?? null,
  };
}

function chooseWalls(
  { bed, area, nz }: Facets,
  bore: Uint8Array,
  sampled: Int32Array,
): { candidates: Set<number>; longest: number } {
  const isWall = (t: number) => !bed[t] && !bore[t] && area[t] > 0 && nz[t] <= SIN_TOP && nz[t] >= -SIN_TOP;
  const walls: number[] = [];
  for (let t = 0; t < bore.length; t++) if (isWall(t)) walls.push(t);
  if (walls.length <= MOST_FACETS) return { candidates: new Set(walls), longest: Infinity };
  const candidates = new Set<number>();
  const take = (from: ArrayLike<number>) => {
    const stride = Math.max(1, Math.ceil(from.length / MOST_FACETS));
    for (let k = 0; k < from.length; k += stride) if (isWall(from[k])) candidates.add(from[k]);
  };
  take(walls);
  take(sampled);
  return { candidates, longest: FINE_MM };
}

/** Cosine between two normals. */
function facing({ nx, ny, nz }: Facets, a: number, b: number): number {
  return nx[a] * nx[b] + ny[a] * ny[b] + nz[a] * nz[b];
}

/** Level width of the solid behind a facet, or of the air before it, up to a wall that bounds it; NaN without one. */
function across(
  mesh: Mesh,
  facets: Facets,
  caster: RayCaster,
  t: number,
  [s, r]: readonly number[],
  through: 'solid' | 'air',
  longest: number,
): number {
  const [x, y, z] = pointOn(mesh, t, s, r);
  const level = Math.hypot(facets.nx[t], facets.ny[t]) * (through === 'air' ? 1 : -1);
  const [dx, dy] = [facets.nx[t] / level, facets.ny[t] / level];
  const length =
    through === 'air'
      ? caster.airAlong(t, x, y, z, dx, dy, 0, longest)
      : caster.solidAlong(t, x, y, z, dx, dy, 0, longest);
  const e = caster.exit;
  if (e < 0 || !(length > 0) || facets.bed[e] || Math.abs(facets.nz[e]) > SIN_TOP) return NaN;
  return facing(facets, t, e) <= -OPPOSITE ? length : NaN;
}

function pointOn({ index, position: p }: Mesh, t: number, s: number, r: number): Point {
  const [a, b, d] = [0, 1, 2].map((k) => index[3 * t + k] * 3);
  return [0, 1, 2].map((k) => p[a + k] + s * (p[b + k] - p[a + k]) + r * (p[d + k] - p[a + k])) as Point;
}

function narrowest(
  mesh: Mesh,
  facets: Facets,
  caster: RayCaster,
  found: Found[],
  through: 'solid' | 'air',
): Finest | null {
  found.sort((a, b) => a.mm - b.mm || a.facet - b.facet);
  let best: Finest | null = null;
  let followed = 0;
  for (const { facet, mm } of found) {
    if (best && (mm > STILL_FINE * best.mm || followed++ >= FOLLOWED)) break;
    for (const place of [MIDDLE, ...AROUND]) {
      const width = across(mesh, facets, caster, facet, place, through, mm * (1 + NEAR));
      if (!(width > 0) || (best && width >= best.mm)) continue;
      if (tapers(mesh, facets, caster, facet, place, width, through)) continue;
      best = { mm: width, at: between(mesh, facets, facet, place, width, through) };
    }
  }
  return best;
}

/** The middle of a detail that was measured from a place on a facet. */
function between(
  mesh: Mesh,
  { nx, ny }: Facets,
  t: number,
  [s, r]: readonly number[],
  width: number,
  through: 'solid' | 'air',
): Point {
  const [x, y, z] = pointOn(mesh, t, s, r);
  const half = (through === 'air' ? width : -width) / 2 / Math.hypot(nx[t], ny[t]);
  return [x + half * nx[t], y + half * ny[t], z];
}

/**
 * Whether the facet and the one that the last ray ended on run together in an edge: they are not parallel, and there is
 * no floor below the air between them, no top above the solid.
 */
function tapers(
  mesh: Mesh,
  facets: Facets,
  caster: RayCaster,
  t: number,
  place: readonly number[],
  width: number,
  through: 'solid' | 'air',
): boolean {
  if (facing(facets, t, caster.exit) <= -PARALLEL) return false;
  const [x, y, z] = between(mesh, facets, t, place, width, through);
  if (through === 'air') caster.airAlong(-1, x, y, z, 0, 0, -1, Infinity);
  else caster.solidAlong(-1, x, y, z, 0, 0, 1, Infinity);
  return caster.exit >= 0 && Math.abs(facets.nz[caster.exit]) < LEVEL_NZ;
}
