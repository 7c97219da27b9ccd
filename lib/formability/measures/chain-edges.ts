import type { Edges } from '../mesh/build-edges';
import type { Mesh } from '../mesh/mesh';
import type { Point } from '../report';
import type { EdgeLine } from '../report-walls';

const MOST_LINES = 120;
const MOST_POINTS = 64;
/** A line goes on over a vertex where it bends by less than 50°. */
const GOES_ON = Math.cos((50 * Math.PI) / 180);
/** A line ends where more found edges than this come together: a tip has no straight way on, and a search for it is slow. */
const MOST_AT_VERTEX = 16;
/** Points that lie within this of the line through their neighbours are left out, mm. */
const STRAIGHT_MM = 0.01;

export interface FoundEdge {
  edge: number;
  kind: 'convex' | 'concave';
  radiusMm: number;
  length: number;
}

/**
 * Edges joined to lines: end to end, of one kind, sharp with sharp and rounded with rounded, on over a vertex in the
 * straightest way. The longest first; a ring ends where it began.
 */
export function chainEdges(mesh: Mesh, edges: Edges, found: readonly FoundEdge[]): EdgeLine[] {
  const at = new Map<number, number[]>();
  found.forEach(({ edge }, n) => {
    for (const v of [edges.low[edge], edges.high[edge]]) {
      const list = at.get(v);
      if (list) list.push(n);
      else at.set(v, [n]);
    }
  });
  const used = new Uint8Array(found.length);
  const lines: (EdgeLine & { vertices: number[] })[] = [];
  found.forEach((first, n) => {
    if (used[n]) return;
    used[n] = 1;
    const line = {
      kind: first.kind,
      radiusMm: first.radiusMm,
      lengthMm: first.length,
      points: [] as Point[],
    };
    const grow = (from: number, v: number): number[] => {
      const vertices: number[] = [];
      let own = from;
      for (let here = v; ;) {
        vertices.push(here);
        const candidates = at.get(here) ?? [];
        if (candidates.length > MOST_AT_VERTEX) return vertices;
        const next = straightest(mesh, edges, found, candidates, own, here, used);
        if (next < 0) return vertices;
        used[next] = 1;
        line.lengthMm += found[next].length;
        line.radiusMm = Math.min(line.radiusMm, found[next].radiusMm);
        own = next;
        here = otherEnd(edges, found[next].edge, here);
      }
    };
    const after = grow(n, edges.high[first.edge]);
    const before = grow(n, edges.low[first.edge]);
    lines.push({ ...line, vertices: [...before.reverse(), ...after] });
  });
  return lines
    .sort((p, q) => q.lengthMm - p.lengthMm || p.vertices[0] - q.vertices[0])
    .slice(0, MOST_LINES)
    .map(({ vertices, ...line }) => ({ ...line, points: thin(vertices.map((v) => pointOf(mesh, v))) }));
}

function straightest(
  mesh: Mesh,
  edges: Edges,
  found: readonly FoundEdge[],
  candidates: readonly number[],
  own: number,
  here: number,
  used: Uint8Array,
): number {
  let best = -1;
  let most = GOES_ON;
  const back = pointOf(mesh, otherEnd(edges, found[own].edge, here));
  const centre = pointOf(mesh, here);
  for (const n of candidates) {
    const alike = found[n].kind === found[own].kind && found[n].radiusMm > 0 === found[own].radiusMm > 0;
    if (used[n] || !alike) continue;
    const on = pointOf(mesh, otherEnd(edges, found[n].edge, here));
    const u = centre.map((value, k) => value - back[k]);
    const w = on.map((value, k) => value - centre[k]);
    const cos =
      u.reduce((sum, value, k) => sum + value * w[k], 0) / (Math.hypot(...u) * Math.hypot(...w) || 1);
    if (cos <= most) continue;
    most = cos;
    best = n;
  }
  return best;
}

function otherEnd(edges: Edges, edge: number, v: number): number {
  return edges.low[edge] === v ? edges.high[edge] : edges.low[edge];
}

function pointOf({ position: p, centre }: Mesh, v: number): Point {
  return [p[3 * v] + centre[0], p[3 * v + 1] + centre[1], p[3 * v + 2]];
}

/** Without points on straight runs, and at most 64. */
function thin(points: Point[]): Point[] {
  const kept = points.filter((point, n) => {
    if (n === 0 || n === points.length - 1) return true;
    return fromLine(point, points[n - 1], points[n + 1]) > STRAIGHT_MM;
  });
  if (kept.length <= MOST_POINTS) return kept;
  const last = kept.length - 1;
  return Array.from({ length: MOST_POINTS }, (_, n) => kept[Math.round((n * last) / (MOST_POINTS - 1))]);
}

function fromLine(p: Point, a: Point, b: Point): number {
  const u = b.map((value, k) => value - a[k]);
  const w = p.map((value, k) => value - a[k]);
  const long = Math.hypot(...u);
  if (long === 0) return Math.hypot(...w);
  return Math.hypot(u[1] * w[2] - u[2] * w[1], u[2] * w[0] - u[0] * w[2], u[0] * w[1] - u[1] * w[0]) / long;
}
