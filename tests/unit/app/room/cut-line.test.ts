import { describe, expect, it } from 'vitest';
import {
  cutThrough,
  openingCut,
} from '@/app/w/[workspace]/templates/[template]/[letter]/_components/cut-line';
import type { Bounds } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/stage-pins';

const wide: Bounds = { min: [-90, -60, 0], max: [90, 60, 40] };
const deep: Bounds = { min: [0, 0, 0], max: [80, 200, 40] };

describe('where the section is cut', () => {
  it('opens along the longer side, through the middle', () => {
    expect(openingCut(wide)).toEqual({ axis: 'y', atMm: 0 });
    expect(openingCut(deep)).toEqual({ axis: 'x', atMm: 40 });
  });

  it('goes a little inside of an edge, towards the middle', () => {
    expect(cutThrough([10, 40, 5], 'y', wide, false)).toEqual({ axis: 'y', atMm: 39.4 });
    expect(cutThrough([-40, 0, 5], 'x', wide, false)).toEqual({ axis: 'x', atMm: -39.4 });
    expect(cutThrough([0, 0.2, 5], 'y', wide, false).atMm).toBe(0);
  });

  it('stays on a vent, but never at the rim, where there is nothing to cut', () => {
    expect(cutThrough([10, 40, 0], 'y', wide, true).atMm).toBe(40);
    for (const exact of [true, false]) {
      expect(cutThrough([0, 60, 0], 'y', wide, exact).atMm).toBe(58.8);
      expect(cutThrough([-90, 0, 0], 'x', wide, exact).atMm).toBe(-88.2);
    }
  });
});
