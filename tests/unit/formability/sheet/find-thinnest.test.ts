import { describe, expect, it } from 'vitest';
import { areaQuantile, orderByThickness } from '@/lib/formability/sheet/area-quantile';
import { findThinnest } from '@/lib/formability/sheet/find-thinnest';
import { measureElements } from '@/lib/formability/sheet/measure-elements';
import { makeRectangle, type Membrane } from '@/lib/formability/sheet/membrane';

/** A sheet drawn out along x so that the thickness is `thin(x)` of the gauge over the formed place x. */
function drawn(cells: number, thin: (x: number) => number, length = 20, width = 10): Membrane {
  const sheet = makeRectangle([0, 0], [length, width], [cells, cells / 2], 0);
  // Material coordinate X(x) = ∫ thin dx: place of each node by stepping.
  const steps = 40_000;
  const places = new Float64Array(cells + 1);
  let [x, material] = [0, 0];
  for (let i = 1; i <= cells; i++) {
    const goal = (i / cells) * length;
    const step = length / steps;
    while (material < goal) {
      material += thin(x + step / 2) * step;
      x += step;
    }
    places[i] = x;
  }
  for (let n = 0; n < sheet.nodes; n++) sheet.at[3 * n] = places[n % (cells + 1)];
  return sheet;
}

const find = (sheet: Membrane, gauge: number) => {
  const stretches = measureElements(sheet, gauge);
  return findThinnest(sheet, stretches, orderByThickness(stretches));
};

describe('least thickness over a disc of 3 mm', () => {
  it('of a valley t = c + k |x − x0| is c + k × 4 r / 3π', () => {
    const sheet = drawn(160, (x) => 0.5 + 0.1 * Math.abs(x - 8));
    const { minMm, at } = find(sheet, 2);
    // Mean of |x| over a disc of radius r is 4 r / 3π.
    expect(minMm).toBeCloseTo(2 * (0.5 + (0.1 * 4 * 1.5) / (3 * Math.PI)), 2);
    expect(at[0]).toBeCloseTo(8, 0);
  });

  it('of an even sheet is its thickness; across a right-angled fold both sides count', () => {
    const even = drawn(40, () => 0.7);
    expect(find(even, 1).minMm).toBeCloseTo(0.7, 3);
    const bent = drawn(160, (x) => (Math.abs(x - 10) < 0.75 ? 0.3 : 0.9));
    const flat = find(bent, 1);
    for (let n = 0; n < bent.nodes; n++) {
      const x = bent.at[3 * n];
      if (x <= 10) continue;
      bent.at[3 * n] = 10;
      bent.at[3 * n + 2] = x - 10;
    }
    const folded = find(bent, 1);
    expect(folded.minMm).toBeCloseTo(flat.minMm, 1);
    expect(folded.at[0]).toBeGreaterThan(9);
  });

  it('is no thinner than the thinnest point and no thicker than the thinnest tenth', () => {
    const sheet = drawn(80, (x) => 0.4 + 0.02 * x);
    const stretches = measureElements(sheet, 1);
    const order = orderByThickness(stretches);
    const { minMm } = findThinnest(sheet, stretches, order);
    expect(minMm).toBeGreaterThan(stretches.thickness[order[0]]);
    expect(minMm).toBeLessThan(areaQuantile(stretches, order, 0.1));
  });
});

describe('area quantiles', () => {
  it('of a thickness that grows evenly along the sheet lie at that share of its length', () => {
    const sheet = drawn(200, (x) => 0.5 + 0.02 * x);
    const end = sheet.at[3 * 200];
    const stretches = measureElements(sheet, 1);
    const order = orderByThickness(stretches);
    for (const share of [0.01, 0.05, 0.5, 0.9]) {
      expect(areaQuantile(stretches, order, share)).toBeCloseTo(0.5 + 0.02 * share * end, 2);
    }
    expect(stretches.formedArea).toBeCloseTo(10 * end, 9);
    expect(stretches.volume).toBeCloseTo(200, 9);
  });
});

describe('folds', () => {
  it('hoop against meridian: λ2 below λ1^−1/2 is web, and has the thickness of one layer', () => {
    // A ring outside a 60 × 60 footprint (P 240) at 20 mm shortens to P / (P + 2π 20) = 0.656341 on the wall.
    const hoop = 240 / (240 + 2 * Math.PI * 20);
    expect(hoop).toBeCloseTo(0.656341, 6);
    const stretch = (along: number, across: number) => {
      const sheet = makeRectangle([0, 0], [4, 4], [4, 4], 0);
      for (let n = 0; n < sheet.nodes; n++) {
        sheet.at[3 * n] *= along;
        sheet.at[3 * n + 1] *= across;
      }
      return measureElements(sheet, 1);
    };
    const web = stretch(2, hoop);
    expect(web.folded.every((one) => one === 1)).toBe(true);
    expect(web.thickness[0]).toBeCloseTo(2 ** -0.5, 12);
    const drawnMore = stretch(2.6, hoop);
    expect(drawnMore.folded.every((one) => one === 0)).toBe(true);
    expect(drawnMore.thickness[0]).toBeCloseTo(1 / (2.6 * hoop), 12);
    const slack = stretch(2, 0.71);
    expect(slack.folded.every((one) => one === 0)).toBe(true);
  });
});
