import { describe, expect, it } from 'vitest';
import { buildBoxTree, visitPairs } from '@/lib/formability/mesh/box-tree';
import { boxesMeet } from '@/lib/formability/mesh/choose-candidates';

describe('search for near boxes', () => {
  it('says so when there are more than it can tell apart, and does not begin', () => {
    const boxes = new Float64Array(6 * (2 ** 23 + 1));
    const tree = buildBoxTree(boxes);
    let visits = 0;
    expect(visitPairs(tree, 0, () => ++visits > 0)).toBe(false);
    expect(visits).toBe(0);
    expect(tree.nodes.length).toBeLessThan(100);
    expect(boxesMeet(boxes, 0)).toBe(true);
  });

  it('finds each pair once where it can', () => {
    const boxes = Float64Array.from([0, 0, 0, 1, 1, 1, 5, 5, 5, 6, 6, 6, 0.5, 0.5, 0.5, 2, 2, 2]);
    const pairs: number[][] = [];
    expect(visitPairs(buildBoxTree(boxes), 0, (a, b) => pairs.push([a, b].sort()) > 0)).toBe(true);
    expect(pairs).toEqual([[0, 2]]);
  });
});
