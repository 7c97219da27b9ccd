import { describe, expect, it } from 'vitest';
import { FILAMENTS, type FilamentId } from '@/lib/formability/materials/filaments';
import { modulusAt } from '@/lib/formability/physics/modulus-at';

const AT = [23, 40, 50, 60, 70, 80, 90, 100, 120, 140, 160, 180];

describe('modulus against temperature: anchored on the two end points of ISO 75, derived', () => {
  it.each<[FilamentId, number[]]>([
    ['pla', [2700, 2516, 1107, 90, 9, 1, 1, 1, 1, 1, 1, 1]],
    ['petg', [1900, 1771, 1695, 1224, 226, 23, 2, 1, 1, 1, 1, 1]],
    ['abs', [2000, 1864, 1784, 1704, 1624, 1014, 330, 45, 1, 1, 1, 1]],
    ['asa', [2000, 1864, 1784, 1704, 1624, 1262, 546, 113, 1, 1, 1, 1]],
    ['hips', [1800, 1678, 1606, 1534, 1338, 685, 143, 14, 1, 1, 1, 1]],
    ['pa6', [2400, 2237, 2141, 1375, 843, 734, 639, 556, 422, 319, 242, 7]],
    ['pa12', [1400, 1305, 904, 751, 624, 519, 431, 359, 248, 7, 1, 1]],
    ['pa12-cf', [6500, 6058, 5798, 4524, 3250, 3250, 3250, 3250, 3250, 1714, 499, 226]],
    ['pc', [2200, 2050, 1962, 1874, 1786, 1698, 1610, 1522, 1211, 143, 1, 1]],
    ['pp', [1200, 1118, 977, 707, 471, 313, 143, 14, 1, 1, 1, 1]],
    ['pet-cf', [5500, 5126, 4906, 4686, 4334, 3454, 2750, 2750, 2750, 904, 519, 298]],
    ['pps-cf', [7000, 6524, 6244, 5964, 5684, 5404, 4452, 3500, 3500, 3500, 3500, 3500]],
    ['resin-ht', [3300, 3076, 2944, 2812, 2680, 2548, 2416, 2284, 904, 639, 452, 319]],
  ])('%s (E3, E4 and the table)', (id, moduli) => {
    expect(AT.map((celsius) => Math.round(modulusAt(FILAMENTS[id], celsius)))).toEqual(moduli);
  });

  it('passes through the end points: 903.5 and 225.9 MPa (E1, E2)', () => {
    for (const { hdtAC, hdtBC, ...rest } of Object.values(FILAMENTS)) {
      expect(modulusAt({ hdtAC, hdtBC, ...rest }, hdtAC.value)).toBeCloseTo(903.529, 2);
      expect(modulusAt({ hdtAC, hdtBC, ...rest }, hdtBC.value)).toBeCloseTo(225.882, 2);
    }
  });
});
