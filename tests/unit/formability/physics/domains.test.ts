import { describe, expect, it } from 'vitest';
import { FILAMENTS } from '@/lib/formability/materials/filaments';
import { contactC, effusivity, toolC } from '@/lib/formability/physics/conduction';
import { halfSpaceRiseK, heatOfPull, lumpedRiseK } from '@/lib/formability/physics/cycle-heating';
import { erf, erfc } from '@/lib/formability/physics/erf';
import { boreFlow, expelTimeS, laminarFlow, orificeFlow } from '@/lib/formability/physics/gas-flow';
import { inflateMembrane, stateAtPressure } from '@/lib/formability/physics/inflate-membrane';
import { bulgeMm, cuspMm } from '@/lib/formability/physics/layer-surface';
import { modulusAt } from '@/lib/formability/physics/modulus-at';
import { ribBucklingMPa, ringCollapseMPa } from '@/lib/formability/physics/plates';
import { gripMPa, selfReleaseDeg } from '@/lib/formability/physics/shrink-grip';

const body = { conductivityWmK: 0.2, densityKgM3: 1270, heatJkgK: 1750 };
const laid = { sheet: body, tool: body, thicknessMm: 1, sheetC: 140, toolC: 20 };
const air = { upstreamPa: 2e5, downstreamPa: 1e5, kelvin: 296 };
const cycling = { tool: body, shellMm: 4, heatJm2: 1e5, cycleS: 60 };

describe('formulas refuse what they do not cover, by name and range', () => {
  it.each<[string, () => unknown, RegExp]>([
    ['a conductivity of 0', () => effusivity({ ...body, conductivityWmK: 0 }), /conductivity \(W\/mK\) is 0: give a figure above 0/],
    ['no density', () => contactC({ ...body, densityKgM3: NaN }, 140, body, 20), /density \(kg\/m³\) is NaN/],
    ['no sheet', () => toolC({ ...laid, thicknessMm: 0 }, 1), /sheet thickness \(mm\) is 0/],
    ['a place above the surface', () => toolC(laid, 1, -0.1), /depth \(mm\) is -0.1: give a figure from 0/],
    ['no printed wall', () => lumpedRiseK({ ...cycling, shellMm: 0 }, 3), /printed wall \(mm\)/],
    ['no cycle', () => halfSpaceRiseK({ ...cycling, cycleS: -1 }, 3), /cycle \(s\) is -1/],
    ['a sheet that is demoulded hotter than formed', () => heatOfPull(body, 1, 70, 80), /forming over demoulding/],
    ['air that flows up', () => orificeFlow(1, 0.6, { ...air, downstreamPa: 3e5 }), /downstream pressure \(Pa\) is 300000: give a figure from 0 to 200000/],
    ['a discharge above 1', () => orificeFlow(1, 1.2, air), /discharge is 1.2/],
    ['air at no temperature', () => laminarFlow({ diameterMm: 1, lengthMm: 5 }, { ...air, kelvin: 0 }), /temperature \(K\)/],
    ['a bore without width', () => boreFlow({ diameterMm: 0, lengthMm: 5 }, 0.6, air), /bore \(mm\) is 0/],
    ['a flat disc as a blown one', () => inflateMembrane(1), /pole stretch is 1: give a figure above 1 to 20/],
    ['a pressure that is none', () => stateAtPressure(NaN), /is NaN/],
    ['no temperature', () => modulusAt(FILAMENTS.pla, NaN), /temperature \(°C\) is NaN/],
    ['a ring without radius', () => ringCollapseMPa(2300, 0.35, 1, 0), /radius \(mm\)/],
    ['ribs at no distance', () => ribBucklingMPa(2300, 0.35, 0.45, 0), /width between ribs/],
    ['a layer without height', () => cuspMm(0, 30), /layer \(mm\) is 0/],
    ['a slope past flat', () => cuspMm(0.2, 91), /draft \(°\) is 91: give a figure from -90 to 90/],
    ['no sheet over the groove', () => bulgeMm(0.2, 0.4, 0, 3), /sheet thickness/],
    ['a shrinkage of 120 %', () => gripMPa({ modulusMPa: 2000, shrinkage: 1.2, wallMm: 1 }, 30), /shrinkage is 1.2/],
    ['friction that pushes', () => selfReleaseDeg(-0.1), /friction is -0.1/],
  ])('%s', (_, work, message) => {
    expect(work).toThrow(RangeError);
    expect(work).toThrow(message);
  }); // prettier-ignore
});

describe('formulas over their whole range', () => {
  it('error function: odd, rising, both ends', () => {
    for (let x = -6; x < 6; x += 0.25) {
      expect(erf(-x)).toBeCloseTo(-erf(x), 14);
      expect(erf(x) + erfc(x)).toBeCloseTo(1, 13);
      expect(erf(x + 0.25)).toBeGreaterThanOrEqual(erf(x));
    }
    expect([erf(0), erf(30), erfc(30)]).toEqual([0, 1, expect.closeTo(0, 300)]);
  });

  it('modulus falls with temperature for every filament, from its own at 23 °C to nothing', () => {
    for (const [id, material] of Object.entries(FILAMENTS)) {
      expect(modulusAt(material, 23), id).toBeCloseTo(material.modulusMPa.value, 9);
      for (let t = 23; t < 400; t += 1)
        expect(modulusAt(material, t + 1), `${id} at ${t}`).toBeLessThanOrEqual(
          modulusAt(material, t) + 1e-9,
        );
      expect(modulusAt(material, 500), id).toBe(1);
    }
  });

  it('contact lies between the two, nearer to the more effusive', () => {
    const metal = { conductivityWmK: 205, densityKgM3: 2700, heatJkgK: 900 };
    for (const [a, b] of [
      [140, 20],
      [20, 140],
      [-10, 5],
    ])
      // prettier-ignore
      expect(Math.abs(contactC(body, a, metal, b) - b)).toBeLessThan(Math.abs(a - b) / 20);
    expect(contactC(body, 90, body, 10)).toBeCloseTo(50, 12);
  });

  it('flow rises as the outside falls, up to choking, and not beyond', () => {
    let before = -1;
    for (let down = 2e5; down > 1.06e5; down -= 2e3) {
      const flow = orificeFlow(1, 0.6, { ...air, downstreamPa: down });
      expect(flow).toBeGreaterThan(before);
      before = flow;
    }
    expect(orificeFlow(1, 0.6, { ...air, downstreamPa: 0 })).toBe(
      orificeFlow(1, 0.6, { ...air, downstreamPa: 1e5 }),
    );
    expect(expelTimeS(1000, 1e-4, air)).toBeCloseTo((1e-6 * 2e5) / (287.05 * 296) / 1e-4, 12);
  });
});
