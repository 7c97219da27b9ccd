import { isBalanced, type Edges } from './build-edges';
import { BED_TOLERANCE_MM } from './measure-facets';
import type { Mesh } from './mesh';
import { UnionFind } from './union-find';

/** Caps off the bed larger than this share of the surface close no body: the file is a heap of loose facets. */
const MOST_CAPS = 0.7;
/** A large hole that looks down, this share of the surface, is the underside of a sheet: the bed closes that. */
const SHEET = 0.2;

/** The mesh with its holes closed by fans, for whatever asks what is inside. */
export interface Capped {
  /** The facets of the open mesh first, then the caps; the same object where nothing was capped. */
  mesh: Mesh;
  /** Every edge is used as often one way as the other: inside and outside are defined everywhere. */
  sealed: boolean;
  /** Some caps lie on the bed, or elsewhere. */
  atBed: boolean;
  elsewhere: boolean;
}

interface Hole {
  edges: number[];
  middle: [number, number, number];
  corners: number;
  highest: number;
  /** Of the fan, and of its projection onto the plan, positive where it looks up. */
  area: number;
  plan: number;
}

/**
 * Closes each hole by a fan of facets from its middle: exact for flat holes of any outline, since what a fan covers
 * too much it covers back. What does not look like the hole of a body stays open.
 * @param area of the surface, mm²
 */
export function capHoles(mesh: Mesh, edges: Edges, area: number): Capped {
  const asIs = { mesh, sealed: isBalanced(edges), atBed: false, elsewhere: false };
  if (asIs.sealed) return asIs;
  const holes = findHoles(mesh, edges);
  const onBed = (hole: Hole) => hole.highest <= BED_TOLERANCE_MM;
  if (holes.reduce((sum, hole) => sum + (onBed(hole) ? 0 : hole.area), 0) > MOST_CAPS * area) return asIs;
  const wanted = holes.filter(
    (hole) => onBed(hole) || !(hole.plan < -0.5 * hole.area && hole.area > SHEET * area),
  );
  if (wanted.length === 0) return asIs;
  const index: number[] = [];
  wanted.forEach((hole, i) => {
    for (const e of hole.edges) {
      const surplus = edges.forward[e] - edges.backward[e];
      const [from, to] = surplus > 0 ? [edges.high[e], edges.low[e]] : [edges.low[e], edges.high[e]];
      for (let n = 0; n < Math.abs(surplus); n++) index.push(from, to, mesh.vertices + i);
    }
  });
  const whole = new Uint32Array(mesh.index.length + index.length);
  whole.set(mesh.index);
  whole.set(index, mesh.index.length);
  const position = new Float64Array(mesh.position.length + 3 * wanted.length);
  position.set(mesh.position);
  wanted.forEach((hole, i) => position.set(hole.middle, mesh.position.length + 3 * i));
  return {
    mesh: {
      ...mesh,
      index: whole,
      position,
      triangles: whole.length / 3,
      vertices: mesh.vertices + wanted.length,
    },
    sealed: wanted.length === holes.length,
    atBed: wanted.some(onBed),
    elsewhere: wanted.some((hole) => !onBed(hole)),
  };
}

function findHoles({ position: p, vertices }: Mesh, edges: Edges): Hole[] {
  const joined = new UnionFind(vertices);
  const open: number[] = [];
  for (let e = 0; e < edges.count; e++) {
    if (edges.forward[e] === edges.backward[e]) continue;
    open.push(e);
    joined.join(edges.low[e], edges.high[e]);
  }
  const holes = new Map<number, Hole>();
  for (const e of open) {
    const root = joined.find(edges.low[e]);
    let hole = holes.get(root);
    if (!hole)
      holes.set(
        root,
        (hole = { edges: [], middle: [0, 0, 0], corners: 0, highest: -Infinity, area: 0, plan: 0 }),
      );
    hole.edges.push(e);
    for (const v of [edges.low[e], edges.high[e]]) {
      for (let k = 0; k < 3; k++) hole.middle[k] += p[3 * v + k];
      hole.highest = Math.max(hole.highest, p[3 * v + 2]);
      hole.corners++;
    }
  }
  for (const hole of holes.values()) {
    hole.middle = hole.middle.map((sum) => sum / hole.corners) as [number, number, number];
    measureFan(p, edges, hole);
  }
  return [...holes.values()];
}

/** Area of the flat outline: the length of the fan's summed area vector, so that folds cancel. */
function measureFan(p: Float64Array, edges: Edges, hole: Hole): void {
  const sum = [0, 0, 0];
  for (const e of hole.edges) {
    const surplus = edges.forward[e] - edges.backward[e];
    const a = [0, 1, 2].map((k) => p[3 * edges.high[e] + k] - hole.middle[k]);
    const b = [0, 1, 2].map((k) => p[3 * edges.low[e] + k] - hole.middle[k]);
    for (let k = 0; k < 3; k++)
      sum[k] += (surplus * (a[(k + 1) % 3] * b[(k + 2) % 3] - a[(k + 2) % 3] * b[(k + 1) % 3])) / 2;
  }
  hole.area = Math.hypot(...sum);
  hole.plan = sum[2];
}
