/** A vertical cut plane, by the line it draws on the bed: y = at (seen from the front) or x = at (seen from the right). */
export interface SectionLine {
  axis: 'x' | 'y';
  atMm: number;
}

export interface SectionMesh {
  /** three numbers a vertex, mm */
  positions: Float32Array;
  /** corners of the triangles; without it every three vertices make one */
  index?: Uint32Array | Uint16Array;
  /** measured draft of each vertex, degrees; without it the draft is that of the triangle itself */
  draftDeg?: Float32Array;
}

/** [along the line, height], mm: along +x for a cut y = at, along +y for a cut x = at. */
export type SectionPoint = [number, number];

export interface SectionSegment {
  from: SectionPoint;
  to: SectionPoint;
  /** draft of the facet that was cut (of the wall itself, not of its trace), degrees */
  draftDeg: number;
}

export interface SectionLoop {
  /** in order, solid on the left: outlines run counter-clockwise, voids clockwise */
  segments: SectionSegment[];
  /** false where the mesh is open and the outline does not come back to its start */
  closed: boolean;
}

export interface Section {
  line: SectionLine;
  loops: SectionLoop[];
  /** extent of the cut, or null where the line misses the mesh */
  boundsMm: { from: number; to: number; low: number; high: number } | null;
}

/**
 * Exact cut of a triangle mesh by a vertical plane, linked into outlines.
 * A vertex that lies on the plane counts as beyond it (all the same way), so a closed mesh always gives closed outlines,
 * also along a wall or an edge that lies in the plane. Linear in triangles.
 */
export function cutSection(mesh: SectionMesh, line: SectionLine): Section {
  const segments = cutTriangles(mesh, line);
  const loops = linkSegments(segments);
  const boundsMm = segments.length === 0 ? null : extent(segments);
  return { line, loops, boundsMm };
}

function cutTriangles(
  { positions: p, index, draftDeg }: SectionMesh,
  { axis, atMm }: SectionLine,
): SectionSegment[] {
  const across = axis === 'y' ? 1 : 0;
  const along = axis === 'y' ? 0 : 1;
  // Seen from the right, the plane's far side is -x; mirrored so that "beyond" is on the same hand for both axes.
  const hand = axis === 'y' ? 1 : -1;
  const corners = index ? index.length : p.length / 3;
  const segments: SectionSegment[] = [];
  for (let t = 0; t < corners; t += 3) {
    const v = index ? [index[t], index[t + 1], index[t + 2]] : [t, t + 1, t + 2];
    const a = p[v[0] * 3 + across] >= atMm;
    const b = p[v[1] * 3 + across] >= atMm;
    const c = p[v[2] * 3 + across] >= atMm;
    if (a === b && b === c) continue;
    // The corner that is alone on its side; walking on from it keeps the triangle's sense of turn.
    const lone = b === c ? 0 : a === c ? 1 : 2;
    const beyond = lone === 0 ? a : lone === 1 ? b : c;
    const [i, j, k] = [v[lone], v[(lone + 1) % 3], v[(lone + 2) % 3]];
    const first = crossing(p, i, j, across, along, atMm);
    const second = crossing(p, k, i, across, along, atMm);
    const forward = beyond === hand > 0;
    const [from, to] = forward ? [second, first] : [first, second];
    if (from[0] === to[0] && from[1] === to[1]) continue;
    const draft = draftDeg ? (draftDeg[i] + draftDeg[j] + draftDeg[k]) / 3 : triangleDraft(p, i, j, k);
    segments.push({ from, to, draftDeg: draft });
  }
  return segments;
}

/** The same two places give the same bits, whichever triangle asks: the ends are taken in a fixed order. */
function crossing(
  p: Float32Array,
  i: number,
  j: number,
  across: number,
  along: number,
  at: number,
): SectionPoint {
  let a = i * 3;
  let b = j * 3;
  const order = p[a] - p[b] || p[a + 1] - p[b + 1] || p[a + 2] - p[b + 2];
  if (order > 0) [a, b] = [b, a];
  const f = (at - p[a + across]) / (p[b + across] - p[a + across]);
  if (f <= 0) return [p[a + along], p[a + 2]];
  if (f >= 1) return [p[b + along], p[b + 2]];
  return [p[a + along] + (p[b + along] - p[a + along]) * f, p[a + 2] + (p[b + 2] - p[a + 2]) * f];
}

function triangleDraft(p: Float32Array, i: number, j: number, k: number): number {
  const [a, b, c] = [i * 3, j * 3, k * 3];
  const [ux, uy, uz] = [p[b] - p[a], p[b + 1] - p[a + 1], p[b + 2] - p[a + 2]];
  const [vx, vy, vz] = [p[c] - p[a], p[c + 1] - p[a + 1], p[c + 2] - p[a + 2]];
  const [x, y, z] = [uy * vz - uz * vy, uz * vx - ux * vz, ux * vy - uy * vx];
  return (Math.asin(Math.max(-1, Math.min(1, z / (Math.hypot(x, y, z) || 1)))) * 180) / Math.PI;
}

function linkSegments(segments: SectionSegment[]): SectionLoop[] {
  const key = ([u, z]: SectionPoint) => `${u},${z}`;
  const starts = new Map<string, number[]>();
  const ends = new Set<string>();
  segments.forEach(({ from, to }, s) => {
    const at = key(from);
    const list = starts.get(at);
    if (list) list.push(s);
    else starts.set(at, [s]);
    ends.add(key(to));
  });
  const used = new Uint8Array(segments.length);
  const walk = (s: number): SectionLoop => {
    const loop: SectionSegment[] = [];
    let next: number | undefined = s;
    while (next !== undefined) {
      used[next] = 1;
      loop.push(segments[next]);
      next = starts.get(key(segments[next].to))?.find((c) => !used[c]);
    }
    return { segments: loop, closed: key(loop[loop.length - 1].to) === key(loop[0].from) };
  };
  const loops: SectionLoop[] = [];
  // Open outlines first, from their loose start, so that none is broken in the middle.
  segments.forEach((segment, s) => {
    if (!used[s] && !ends.has(key(segment.from))) loops.push(walk(s));
  });
  segments.forEach((_, s) => {
    if (!used[s]) loops.push(walk(s));
  });
  return loops;
}

function extent(segments: SectionSegment[]): NonNullable<Section['boundsMm']> {
  const bounds = { from: Infinity, to: -Infinity, low: Infinity, high: -Infinity };
  for (const { from, to } of segments) {
    for (const [u, z] of [from, to]) {
      bounds.from = Math.min(bounds.from, u);
      bounds.to = Math.max(bounds.to, u);
      bounds.low = Math.min(bounds.low, z);
      bounds.high = Math.max(bounds.high, z);
    }
  }
  return bounds;
}

/** Area of the cut, mm² (signed: voids count off); only closed outlines count. */
export function sectionArea({ loops }: Section): number {
  let twice = 0;
  for (const { segments, closed } of loops) {
    if (!closed) continue;
    for (const { from, to } of segments) twice += from[0] * to[1] - to[0] * from[1];
  }
  return twice / 2;
}
