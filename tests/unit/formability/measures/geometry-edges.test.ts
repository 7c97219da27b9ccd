import { describe, expect, it } from 'vitest';
import { extrude, lathe } from '../../../fixtures/meshes/solids';
import { reportOn } from '../run-engine';

/** Thresholds of what counts as a vent and as an edge, each with a part just inside and one just beyond. */

const coarse = { grid: { cellMm: 1 } };

describe('vents', () => {
  /** A cup of 20 mm with a bore, 10 mm long. */
  const vents = (diameter: number) => {
    const r = diameter / 2;
    return reportOn(lathe([[r, 0], [20, 0], [20, 20], [12, 20], [12, 10], [r, 10]], 24), coarse).vents.length; // prettier-ignore
  };

  it('are bores up to 3 mm wide, with 0.05 mm for the corners of a polygon', () => {
    expect([vents(3.0497), vents(3.0503)]).toEqual([1, 0]);
  });
});

describe('edges', () => {
  /** A bar 60 mm long whose top is two slopes: their fold is all that changes. */
  const roof = (foldDeg: number) => {
    const rise = 20 * Math.tan(((foldDeg / 2) * Math.PI) / 180);
    return reportOn(extrude([[-20, 0], [20, 0], [20, 10], [0, 10 + rise], [-20, 10]], 60), coarse).edges; // prettier-ignore
  };

  it('a fold of more than 40° is an edge', () => {
    const [below, above] = [roof(39.7), roof(40.3)];
    expect(above.sharpConvexMm - below.sharpConvexMm).toBeCloseTo(60, 0);
  });
});
