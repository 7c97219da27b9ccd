import type { Point } from '../report';
import type { Facets } from './measure-facets';
import type { Mesh } from './mesh';

/** Cells along a side of the map of directions that facets are gathered in; odd, so that an axis is in the middle of one. */
const MAP = 49;
/** A side must have this share of the surface to be stood on. */
const LEAST_SHARE = 0.01;
const MOST_SIDES = 10;

/** A direction that could be up, and the outline of what would then stand on the bed. */
export interface Stand {
  up: Point;
  /** Area of the hull round all contact with the bed, mm². */
  baseMm2: number;
}

/**
 * The flat sides on which the part can stand, the largest base first. A ring counts with all that it encloses: that
 * is how far apart its feet are.
 */
export function findStands(mesh: Mesh, facets: Facets): Stand[] {
  const stands: Stand[] = [];
  for (const normal of flatSides(facets)) {
    const up: Point = [-normal[0] || 0, -normal[1] || 0, -normal[2] || 0];
    // The part as it stands is no other stand.
    if (up[2] < 1) stands.push({ up, baseMm2: baseOf(mesh, facets, up) });
  }
  return stands.filter((stand) => stand.baseMm2 > 0).sort((a, b) => b.baseMm2 - a.baseMm2);
}

/** Area of the hull round what touches the bed when `up` is up: facets that face it, all corners at its height. */
export function baseOf({ triangles, index, position: p }: Mesh, facets: Facets, up: Point): number {
  let lowest = Infinity;
  let highest = -Infinity;
  for (let i = 0; i < p.length; i += 3) {
    const height = p[i] * up[0] + p[i + 1] * up[1] + p[i + 2] * up[2];
    if (height < lowest) lowest = height;
    if (height > highest) highest = height;
  }
  const level = lowest + 1e-4 * (highest - lowest) + 1e-4;
  const [u, v] = acrossAxes(up);
  const points: [number, number][] = [];
  for (let t = 0; t < triangles; t++) {
    if (facets.area[t] === 0 || facets.nx[t] * up[0] + facets.ny[t] * up[1] + facets.nz[t] * up[2] > -0.999)
      continue;
    const corners = [3 * index[3 * t], 3 * index[3 * t + 1], 3 * index[3 * t + 2]];
    if (corners.some((i) => p[i] * up[0] + p[i + 1] * up[1] + p[i + 2] * up[2] > level)) continue;
    for (const i of corners) {
      points.push([
        p[i] * u[0] + p[i + 1] * u[1] + p[i + 2] * u[2],
        p[i] * v[0] + p[i + 1] * v[1] + p[i + 2] * v[2],
      ]);
    }
  }
  return hullArea(points);
}

/** Mean normals of the largest groups of facets that face one way; those along an axis exactly so. */
function flatSides(facets: Facets): Point[] {
  const { area, nx, ny, nz } = facets;
  const sums = new Float64Array(6 * MAP * MAP * 4);
  for (let t = 0; t < area.length; t++) {
    if (area[t] === 0) continue;
    const o = 4 * cellOf(nx[t], ny[t], nz[t]);
    sums[o] += area[t];
    sums[o + 1] += area[t] * nx[t];
    sums[o + 2] += area[t] * ny[t];
    sums[o + 3] += area[t] * nz[t];
  }
  const cells: number[] = [];
  for (let o = 0; o < sums.length; o += 4) if (sums[o] > LEAST_SHARE * facets.totalArea) cells.push(o);
  cells.sort((a, b) => sums[b] - sums[a] || a - b);
  return cells.slice(0, MOST_SIDES).map((o) => {
    const length = Math.hypot(sums[o + 1], sums[o + 2], sums[o + 3]);
    const mean = [1, 2, 3].map((k) => sums[o + k] / length);
    const axis = mean.findIndex((value) => Math.abs(value) > 1 - 1e-6);
    return mean.map((value, k) => (axis < 0 ? value : k === axis ? Math.sign(value) : 0)) as Point;
  });
}

/** A cube's side and a cell on it, for a direction; a whole number of cells lies about each axis. */
function cellOf(x: number, y: number, z: number): number {
  const ax = x < 0 ? -x : x;
  const ay = y < 0 ? -y : y;
  const az = z < 0 ? -z : z;
  const half = (MAP - 1) / 2;
  if (az >= ax && az >= ay) {
    const side = z > 0 ? 5 : 4;
    return (side * MAP + ((half * (x / az + 1) + 0.5) | 0)) * MAP + ((half * (y / az + 1) + 0.5) | 0);
  }
  if (ay >= ax) {
    const side = y > 0 ? 3 : 2;
    return (side * MAP + ((half * (z / ay + 1) + 0.5) | 0)) * MAP + ((half * (x / ay + 1) + 0.5) | 0);
  }
  const side = x > 0 ? 1 : 0;
  return (side * MAP + ((half * (y / ax + 1) + 0.5) | 0)) * MAP + ((half * (z / ax + 1) + 0.5) | 0);
}

function acrossAxes(up: Point): [Point, Point] {
  const k = up.map(Math.abs).indexOf(Math.min(...up.map(Math.abs)));
  const other: Point = [0, 0, 0];
  other[k] = 1;
  const u = cross(other, up);
  const length = Math.hypot(...u);
  const unit = u.map((value) => value / length) as Point;
  return [unit, cross(up, unit)];
}

function cross(a: Point, b: Point): Point {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}

/** Area of the convex hull, by the monotone chain. */
function hullArea(points: [number, number][]): number {
  if (points.length < 3) return 0;
  points.sort((a, b) => a[0] - b[0] || a[1] - b[1]);
  const half = (from: [number, number][]) => {
    const chain: [number, number][] = [];
    for (const q of from) {
      while (chain.length > 1 && turnOf(chain[chain.length - 2], chain[chain.length - 1], q) <= 0)
        chain.pop();
      chain.push(q);
    }
    chain.pop();
    return chain;
  };
  const hull = [...half(points), ...half([...points].reverse())];
  return hull.reduce((sum, [x, y], i) => {
    const [s, t] = hull[(i + 1) % hull.length];
    return sum + (x * t - s * y) / 2;
  }, 0);
}

function turnOf(a: [number, number], b: [number, number], c: [number, number]): number {
  return (b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0]);
}
