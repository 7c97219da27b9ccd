import { describe, expect, it } from 'vitest';
import { buildEdges } from '@/lib/formability/mesh/build-edges';
import { splitTJunctions } from '@/lib/formability/mesh/split-t-junctions';

/** Loose facets in one place, and one more whose corner lies in the middle of an edge of all the others. */
function lace(count: number) {
  const position = new Float64Array(9 * (count + 1));
  for (let t = 0; t < count; t++) position.set([0, 0, 0, 10, 0, 0, 5, 10, 0], 9 * t);
  position.set([5, 0, 0, 4, -5, 0, 6, -5, 0], 9 * count);
  const index = Uint32Array.from({ length: 3 * (count + 1) }, (_, v) => v);
  return splitTJunctions(index, position, buildEdges(index, position.length / 3), 1e-4);
}

describe('corners on the edges of others', () => {
  it('splits each facet that has one: ten become twenty, the eleventh stays', () => {
    const split = lace(10);
    expect(split?.vertices).toEqual([30]);
    expect(split?.index).toHaveLength(3 * 21);
  });

  it('splits nothing after half a search: 3 × 1060 open edges in one place are 5.06 million pairs', () => {
    expect(lace(1060)).toBeNull();
  });
});
