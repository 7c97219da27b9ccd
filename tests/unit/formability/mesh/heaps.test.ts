import { describe, expect, it } from 'vitest';
import type { Columns } from '@/lib/formability/dexel/columns';
import { buildEdges } from '@/lib/formability/mesh/build-edges';
import { chooseCandidates } from '@/lib/formability/mesh/choose-candidates';
import { findFloating } from '@/lib/formability/mesh/find-floating';
import { findMeetings, type Meetings } from '@/lib/formability/mesh/find-meetings';
import type { Shells } from '@/lib/formability/mesh/find-shells';
import type { Mesh } from '@/lib/formability/mesh/mesh';

/** Tetrahedra of 1 mm, each a shell: at (x, y) for the first to the last, one millimetre above the bed. */
function heap(count: number, place: (n: number) => [number, number]) {
  const position = new Float64Array(12 * count);
  const index = new Uint32Array(12 * count);
  const boxes = new Float64Array(6 * count);
  for (let n = 0; n < count; n++) {
    const [x, y] = place(n);
    position.set([x, y, 1, x + 1, y, 1, x, y + 1, 1, x, y, 2], 12 * n);
    boxes.set([x, y, 1, x + 1, y + 1, 2], 6 * n);
    for (const [c, v] of [0, 2, 1, 0, 1, 3, 1, 2, 3, 2, 0, 3].entries()) index[12 * n + c] = 4 * n + v;
  }
  const mesh: Mesh = { triangles: 4 * count, vertices: 4 * count, index, position, centre: [0, 0] };
  const ofFacet = Uint32Array.from({ length: 4 * count }, (_, t) => t >> 2);
  return { mesh, boxes, shells: { count, ofFacet } as Shells };
}

describe('heaps of shells', () => {
  it('fifty thousand in one place: the choice of facets gives up, and so does the search', () => {
    const { mesh, boxes, shells } = heap(50_000, () => [0, 0]);
    const columns = { oddColumns: new Uint32Array(0) } as unknown as Columns;
    const edges = buildEdges(mesh.index, mesh.vertices);
    const candidates = chooseCandidates(mesh, shells, edges, boxes, columns, 1e-3);
    expect([candidates.apart, candidates.complete]).toEqual([false, false]);
    expect(findMeetings(mesh, shells, candidates, 1e-3, false).complete).toBe(false);
  });

  it('a small one is chosen from in full', () => {
    const { mesh, boxes, shells } = heap(16_000, (n) => [(n >> 1) * 3, 0]);
    const columns = { oddColumns: new Uint32Array(0) } as unknown as Columns;
    const edges = buildEdges(mesh.index, mesh.vertices);
    const candidates = chooseCandidates(mesh, shells, edges, boxes, columns, 1e-3);
    expect([candidates.apart, candidates.complete]).toEqual([true, true]);
    expect(candidates.facets).toHaveLength(64_000);
  });

  it('nothing is said of a hundred thousand bodies in the air whose contacts are not known', () => {
    const inTheAir = (count: number, complete: boolean) => {
      const { mesh, boxes, shells } = heap(count, (n) => [2 * (n % 300), 2 * Math.floor(n / 300)]);
      const meetings = { joined: new Set<number>(), complete } as Meetings;
      return findFloating(mesh, shells, boxes, meetings, 1e-3).length;
    };
    expect([inTheAir(1900, false), inTheAir(2100, false), inTheAir(2100, true)]).toEqual([1900, 0, 2100]);
    expect(inTheAir(100_000, false)).toBe(0);
  });
});
