import { describe, expect, it } from 'vitest';
import { chainEdges } from '@/lib/formability/measures/chain-edges';
import { buildEdges } from '@/lib/formability/mesh/build-edges';
import type { Mesh } from '@/lib/formability/mesh/mesh';

/** Lines from the spokes of a flat fan, each 10 mm long; the middle is the last vertex. */
function chainSpokes(spokes: number) {
  const index = Uint32Array.from({ length: 3 * spokes }, (_, c) => {
    const t = Math.floor(c / 3);
    return c % 3 === 2 ? spokes : (t + (c % 3)) % spokes;
  });
  const position = new Float64Array(3 * (spokes + 1));
  for (let v = 0; v < spokes; v++) {
    position[3 * v] = 10 * Math.cos((2 * Math.PI * v) / spokes);
    position[3 * v + 1] = 10 * Math.sin((2 * Math.PI * v) / spokes);
  }
  const mesh: Mesh = { triangles: spokes, vertices: spokes + 1, index, position, centre: [0, 0] };
  const edges = buildEdges(index, mesh.vertices);
  const ofSpokes = Array.from({ length: edges.count }, (_, e) => e).filter((e) => edges.high[e] === spokes);
  return chainEdges(
    mesh,
    edges,
    ofSpokes.map((edge) => ({ edge, kind: 'convex', radiusMm: 0, length: 10 })),
  );
}

describe('lines over a vertex where many edges meet', () => {
  it('go straight on with up to 16 edges and end there with more', () => {
    expect(chainSpokes(16).map((line) => line.lengthMm)).toEqual(Array(8).fill(20));
    expect(chainSpokes(18).map((line) => line.lengthMm)).toEqual(Array(18).fill(10));
  });

  it('are not searched for among forty thousand spokes of one tip', () => {
    const lines = chainSpokes(40_000);
    expect(lines).toHaveLength(120);
    expect(lines[0].lengthMm).toBe(10);
  });
});

describe('a line of two edges', () => {
  /** From the origin 10 mm along x, then on to a point; both edges belong to facets that meet below. */
  function chainTo(corner: [number, number], end: [number, number]) {
    const position = Float64Array.of(0, 0, 0, ...corner, 0, ...end, 0, 5, -40, 0);
    const index = Uint32Array.of(0, 1, 3, 1, 2, 3);
    const mesh: Mesh = { triangles: 2, vertices: 4, index, position, centre: [0, 0] };
    const edges = buildEdges(index, 4);
    const upper = Array.from({ length: edges.count }, (_, e) => e).filter((e) => edges.high[e] < 3);
    return chainEdges(
      mesh,
      edges,
      upper.map((edge) => ({ edge, kind: 'convex', radiusMm: 0, length: 10 })),
    );
  }

  it('goes on where it bends by less than 50°', () => {
    const bent = (deg: number) => {
      const rad = (deg * Math.PI) / 180;
      return chainTo([10, 0], [10 + 10 * Math.cos(rad), -10 * Math.sin(rad)]).length;
    };
    expect([bent(49.8), bent(50.2)]).toEqual([1, 2]);
  });

  it('leaves out a point within 0.01 mm of the line through its neighbours', () => {
    const points = (off: number) => chainTo([10, off], [20, 0])[0].points.length;
    expect([points(0.00995), points(0.01005)]).toEqual([2, 3]);
  });
});
