import type { Shells } from './find-shells';
import type { Meetings } from './find-meetings';
import { BED_TOLERANCE_MM } from './measure-facets';
import type { Mesh } from './mesh';
import { shellVolumes } from './signed-volume';
import { UnionFind } from './union-find';
import { WindingProbe } from './winding-probe';

/** Pairs of shells compared before nothing is said of bodies in the air: 2,000 against 2,000. */
const MOST_PAIRS = 4e6;

/**
 * Bodies in the air: solid shells that neither stand on the bed nor hang together, by contact, crossing or lying
 * inside, with one that does.
 */
export function findFloating(
  mesh: Mesh,
  shells: Shells,
  boxes: Float64Array,
  meetings: Meetings,
  tolerance: number,
): number[] {
  const { index, position: p } = mesh;
  const { count, ofFacet } = shells;
  const bed = Math.max(BED_TOLERANCE_MM, tolerance);
  const volumes = shellVolumes(mesh, ofFacet, count);
  const solid = (s: number) => volumes[s] > 0;
  const high: number[] = [];
  for (let s = 0; s < count; s++) if (solid(s) && boxes[6 * s + 2] > bed) high.push(s);
  if (high.length === 0) return [];
  const joined = new UnionFind(count);
  for (const key of meetings.joined) {
    const [s, t] = [Math.floor(key / count), key % count];
    if (solid(s) && solid(t)) joined.join(s, t);
  }
  const firstVertex = new Int32Array(count).fill(-1);
  for (let t = mesh.triangles - 1; t >= 0; t--) firstVertex[ofFacet[t]] = index[3 * t];
  const grounded = new Set<number>();
  for (let s = 0; s < count; s++) if (solid(s) && boxes[6 * s + 2] <= bed) grounded.add(joined.find(s));
  if (high.every((s) => grounded.has(joined.find(s)))) return [];
  const probe = new WindingProbe(index, p);
  const windingAt = (s: number, counts: (shell: number) => boolean) => {
    const v = 3 * firstVertex[s];
    return probe.windingAt(p[v], p[v + 1], p[v + 2], true, (facet) => counts(ofFacet[facet]));
  };
  const carries = (s: number) => solid(s) && grounded.has(joined.find(s));
  // What meets the skin of a void meets the body round it.
  for (const key of meetings.joined) {
    const pair = [Math.floor(key / count), key % count];
    const hole = pair.find((s) => !solid(s));
    const body = pair.find(solid);
    if (hole === undefined || body === undefined || carries(body)) continue;
    if (windingAt(hole, carries) > 0) grounded.add(joined.find(body));
  }
  const lone = high.filter((s) => !carries(s) && windingAt(s, (shell) => shell !== s) <= 0);
  if (meetings.complete) return lone;
  return lone.length * count > MOST_PAIRS ? [] : lone.filter((s) => standsApart(boxes, count, s, solid));
}

/** Where contacts were not searched to the end: only what no other box comes near counts as floating. */
function standsApart(boxes: Float64Array, count: number, s: number, solid: (s: number) => boolean): boolean {
  for (let other = 0; other < count; other++) {
    if (other === s || !solid(other)) continue;
    let near = true;
    for (let k = 0; k < 3; k++) {
      if (
        boxes[6 * s + k] > boxes[6 * other + 3 + k] + 1e-3 ||
        boxes[6 * other + k] > boxes[6 * s + 3 + k] + 1e-3
      )
        near = false;
    }
    if (near) return false;
  }
  return true;
}
