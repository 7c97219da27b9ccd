import { describe, expect, it } from 'vitest';
import { FacetCover } from '@/lib/formability/mesh/facet-cover';
import { FacetCuts } from '@/lib/formability/mesh/facet-cuts';

/** A facet of 2 × 2 mm with `lines` long cuts, leaning so that each crosses every other. */
function coverWith(lines: number) {
  const position = Float64Array.from([0, 0, 0, 2, 0, 0, 0, 2, 0]);
  const cuts = new FacetCuts(2);
  for (let n = 0; n < lines; n++) {
    const from = 0.1 + (0.7 * n) / lines;
    const to = 0.8 - (0.7 * n) / lines;
    const points = Float64Array.from([from, 0.1 + (0.1 * n) / lines, 0, to, 0.9 + (0.1 * n) / lines, 0]);
    cuts.add(0, 1, { points, startEdgeOfA: -1, endEdgeOfA: -1, startEdgeOfB: -1, endEdgeOfB: -1 });
  }
  return new FacetCover(position, [0, 3, 6], cuts, 0);
}

describe('share of a cut facet that lies outside', () => {
  it('takes its steps from what is left for the body', () => {
    const budget = { steps: 1e6 };
    expect(coverWith(20).shareOutside(0, budget)).toBeGreaterThan(0);
    const used = 1e6 - budget.steps;
    expect(used).toBeGreaterThan((20 * 19) / 2);
    expect(coverWith(20).shareOutside(0, { steps: used - 1 })).toBeNull();
    expect(coverWith(20).shareOutside(0, { steps: used })).not.toBeNull();
  });

  it('gives up on eight thousand segments that all cross: 32 million heights', () => {
    expect(coverWith(8000).shareOutside(0, { steps: 2e7 })).toBeNull();
  });
});
