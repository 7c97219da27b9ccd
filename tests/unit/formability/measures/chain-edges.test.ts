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
