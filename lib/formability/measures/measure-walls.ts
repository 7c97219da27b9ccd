import { ENCLOSED, gapFloor, type Air } from '../dexel/air';
import type { Columns } from '../dexel/columns';
import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { Point } from '../report';
import type { WallsReport } from '../report-walls';
import type { FacetGrid } from './facet-grid';
import { RayCaster } from './ray-caster';
import { sampleSurface, type Sample } from './sample-surface';
import type { Visibility } from './visibility';

/** Rays over what the sheet meets; fewer on large meshes, where each costs more. */
const RAYS = 12_000;
const RAYS_LARGE = 5_000;
const LARGE_MESH = 300_000;
const BED_RAYS = 1_000;
/** A cavity smaller than this share of the part leaves it solid. */
const HOLLOW_SHARE = 0.03;
/** Flatter than 60° is a wall, steeper-facing is a top. */
const SIN_TOP = Math.sin(Math.PI / 3);
/** A face bounds a wall where it lies within 31° of parallel to the first (15° of draft on both): no corner, no tip. */
const OPPOSITE = Math.cos((31 * Math.PI) / 180);
/** The thinnest samples are followed over their facets: a wall that tapers is thinnest at its end. */
const FOLLOWED = 24;
const HALVINGS = 10;
const MOST_MOVES = 40;

export interface Walls {
  report: WallsReport;
  /** Normal wall thickness of each facet that the sheet meets, mm; NaN elsewhere and where nothing bounds it. */
  ofFacet: Float32Array;
  /** Facets that rays were cast from, spread evenly over what the sheet meets. */
  sampled: Int32Array;
}

interface Measured extends Sample {
  thickness: number;
}

/**
 * Wall thickness along the inward normal: exact rays from points spread evenly over what the sheet meets, to where
 * they leave the solid (overlapping bodies count as one) through a face within 31° of parallel to the first that does
 * not stand on the bed. Walls are faces below 60° of draft, tops those above. Least, 5 % and median by area; the least
 * is followed from the thinnest samples to where it is least.
 */
export function measureWalls(
  mesh: Mesh,
  facets: Facets,
  grid: FacetGrid,
  columns: Columns,
  air: Air,
  visibility: Visibility,
  bore: Uint8Array,
): Walls {
  const hollow = findCavities(columns, air);
  const caster = new RayCaster(mesh, grid);
  const thickness = (t: number, s: number, r: number) => thicknessAt(mesh, facets, caster, t, s, r);
  const measured = (chosen: Uint8Array, rays: number) => {
    const { samples, ofFacet } = sampleSurface(mesh, facets, chosen, rays);
    return {
      ofFacet,
      all: samples.map((one) => ({ ...one, thickness: thickness(one.facet, one.s, one.r) })),
    };
  };
  const { touched } = visibility;
  const { bed } = facets;
  const met = new Uint8Array(mesh.triangles);
  for (let t = 0; t < met.length; t++) if (touched[t] && !bed[t] && !bore[t]) met[t] = 1;
  const { all, ofFacet } = measured(met, mesh.triangles > LARGE_MESH ? RAYS_LARGE : RAYS);
  const found = all.filter((sample) => sample.thickness > 0).sort(byThickness);
  const walls = found.filter(({ facet }) => facets.nz[facet] < SIN_TOP);
  const tops = found.filter(({ facet }) => facets.nz[facet] >= SIN_TOP);
  const floors = hollow.sealed ? measured(facets.bed, BED_RAYS).all.filter((one) => one.thickness > 0) : [];
  const least = followThinnest(mesh, walls, thickness);
  return {
    report: {
      minMm: least?.thickness ?? null,
      minAt: least?.at ?? null,
      p05Mm: quantile(walls, 0.05),
      medianMm: quantile(walls, 0.5),
      topMm: hollow.hollow ? (followThinnest(mesh, tops, thickness)?.thickness ?? null) : null,
      floorMm: followThinnest(mesh, floors.sort(byThickness), thickness)?.thickness ?? null,
      ...hollow,
    },
    ofFacet: mapThickness(all, ofFacet),
    sampled: Int32Array.from(all, (sample) => sample.facet),
  };
}

function byThickness(a: Measured, b: Measured): number {
  return a.thickness - b.thickness || a.facet - b.facet;
}

/** Each facet's thickness from the sample that speaks for it; the least of a large facet's own. */
function mapThickness(all: Measured[], ofFacet: Int32Array): Float32Array {
  const least = Float32Array.from(all, (sample) => sample.thickness);
  for (let k = all.length - 1; k > 0; k--) {
    const thinner = least[k] > 0 && !(least[k - 1] <= least[k]);
    if (thinner && all[k - 1].facet === all[k].facet) least[k - 1] = least[k];
  }
  const map = new Float32Array(ofFacet.length);
  for (let t = 0; t < map.length; t++) map[t] = ofFacet[t] < 0 ? NaN : least[ofFacet[t]];
  return map;
}

/** Air that is closed off from the air above the part: how much, and whether the bed closes it or the part does. */
function findCavities(columns: Columns, air: Air): Pick<WallsReport, 'hollow' | 'sealed' | 'openAtBed'> {
  const { start, count, z } = columns;
  const volume = new Float64Array(air.pockets);
  const onBed = new Uint8Array(air.pockets);
  let solid = 0;
  let enclosed = 0;
  for (let c = 0; c < count.length; c++) {
    for (let k = 0, s = start[c]; k < count[c]; k++, s += 2) {
      solid += z[s + 1] - z[s];
      if (air.state[s] !== ENCLOSED) continue;
      const floor = gapFloor(columns, c, s);
      volume[air.pocket[s]] += z[s] - floor;
      enclosed += z[s] - floor;
      if (s === start[c]) onBed[air.pocket[s]] = 1;
    }
  }
  const least = HOLLOW_SHARE * (solid + enclosed);
  let sealed = false;
  let openAtBed = false;
  for (let pocket = 0; pocket < volume.length; pocket++) {
    if (volume[pocket] <= least) continue;
    if (onBed[pocket]) openAtBed = true;
    else sealed = true;
  }
  return { hollow: sealed || openAtBed, sealed, openAtBed };
}

type Thickness = (t: number, s: number, r: number) => number;

function thicknessAt(mesh: Mesh, facets: Facets, caster: RayCaster, t: number, s: number, r: number): number {
  const { index, position: p } = mesh;
  const a = index[3 * t] * 3;
  const b = index[3 * t + 1] * 3;
  const d = index[3 * t + 2] * 3;
  const x = p[a] + s * (p[b] - p[a]) + r * (p[d] - p[a]);
  const y = p[a + 1] + s * (p[b + 1] - p[a + 1]) + r * (p[d + 1] - p[a + 1]);
  const z = p[a + 2] + s * (p[b + 2] - p[a + 2]) + r * (p[d + 2] - p[a + 2]);
  const nx = facets.nx[t];
  const ny = facets.ny[t];
  const nz = facets.nz[t];
  const length = caster.solidAlong(t, x, y, z, -nx, -ny, -nz, Infinity);
  const e = caster.exit;
  if (e < 0 || facets.bed[e] || !(length > 0)) return NaN;
  return -(nx * facets.nx[e] + ny * facets.ny[e] + nz * facets.nz[e]) >= OPPOSITE ? length : NaN;
}

/** The least thickness: from the thinnest samples (which come first) on, in ever smaller steps over their facets. */
function followThinnest(
  mesh: Mesh,
  samples: Measured[],
  thickness: Thickness,
): { thickness: number; at: Point } | null {
  if (samples.length === 0) return null;
  const { index, position: p } = mesh;
  const corners = (t: number) => [0, 1, 2].map((k) => index[3 * t + k] * 3);
  const far = (a: number, b: number) => Math.hypot(p[a] - p[b], p[a + 1] - p[b + 1], p[a + 2] - p[b + 2]);
  let best = samples[0];
  for (const sample of samples.slice(0, FOLLOWED)) {
    const [a, b, d] = corners(sample.facet);
    const spacing = Math.sqrt(sample.area);
    let now = sample;
    for (let k = 0, share = 1, moves = 0; k < HALVINGS && moves < MOST_MOVES; moves++) {
      const ds = Math.min(0.5, (share * spacing) / far(a, b));
      const dr = Math.min(0.5, (share * spacing) / far(a, d));
      const around = [[ds, 0], [-ds, 0], [0, dr], [0, -dr], [ds, -dr], [-ds, dr]]; // prettier-ignore
      let next = now;
      for (const [es, er] of around) {
        const [s, r] = [now.s + es, now.r + er];
        if (s <= 0 || r <= 0 || s + r >= 1) continue;
        const found = thickness(sample.facet, s, r);
        if (found < next.thickness) next = { ...now, s, r, thickness: found };
      }
      if (next === now) {
        share /= 2;
        k++;
      } else now = next;
    }
    if (now.thickness < best.thickness) best = now;
  }
  const [a, b, d] = corners(best.facet);
  const at = [0, 1, 2].map(
    (k) => p[a + k] + best.s * (p[b + k] - p[a + k]) + best.r * (p[d + k] - p[a + k]),
  ) as Point;
  return { thickness: best.thickness, at };
}

/** Thickness that a share of the samples' area lies below; the thinnest come first. */
function quantile(samples: Measured[], share: number): number | null {
  const total = samples.reduce((sum, { area }) => sum + area, 0);
  let below = 0;
  for (const { thickness, area } of samples) {
    below += area;
    if (below >= share * total) return thickness;
  }
  return null;
}
