import { describe, expect, it } from 'vitest';
import { clampedRectangle } from '@/lib/formability/physics/clamped-rectangle';
import { densityForSpan, infillCellMm, infillSpanMm } from '@/lib/formability/physics/infill';
import {
  clampedDisc,
  clampedPlate,
  clampedStrip,
  ribBucklingMPa,
  rigidity,
  ringCollapseMPa,
  supportedDisc,
  supportedRectangle,
  supportedStrip,
  supportedTriangle,
} from '@/lib/formability/physics/plates';

/** D = 1, q = 1: figures are the tables' own coefficients. */
const unit = { thicknessMm: 1, pressureMPa: 1, modulusMPa: 12 * (1 - 0.09), poisson: 0.3 };
const moment = (stress: number) => stress / 6;
const skin = { thicknessMm: 1.2, pressureMPa: 0.4, modulusMPa: 2300, poisson: 0.35 };

describe('plates: Timoshenko and Woinowsky-Krieger, tables 8 and 35, recomputed', () => {
  it.each([
    [1, 0.00406235, 0.0478864],
    [1.5, 0.007724, 0.08116],
    [2, 0.0101287, 0.101683],
  ])('simply supported, sides 1 : %f (P1 to P4)', (aspect, sag, bending) => {
    const answer = supportedRectangle(unit, 1, aspect);
    expect(answer.sagMm / sag).toBeCloseTo(1, 4);
    expect(moment(answer.stressMPa) / bending).toBeCloseTo(1, 4);
    expect(supportedRectangle(unit, aspect, 1)).toEqual(answer);
  });

  it.each([
    [1, 0.00126532, 0.0513336],
    [1.5, 0.00219652, 0.07566],
    [2, 0.002533, 0.0828669],
  ])('clamped, sides 1 : %f (P5, P6, P8, P9)', (aspect, sag, edge) => {
    const answer = clampedRectangle(aspect);
    expect(answer.sag / sag).toBeCloseTo(1, 3);
    expect(Math.abs(answer.edgeMoment / edge - 1)).toBeLessThan(1e-3);
  });

  it('a long clamped plate is a strip: 1/384 and 1/12', () => {
    const { sag, edgeMoment } = clampedRectangle(5);
    expect(sag * 384).toBeCloseTo(1, 2);
    expect(edgeMoment * 12).toBeCloseTo(1, 2);
  });

  it('printed skins: discs, strip, square, triangle (P11 to P16)', () => {
    expect(clampedDisc(skin, 10)).toEqual({
      sagMm: expect.closeTo(0.165591, 5),
      stressMPa: expect.closeTo(20.8333, 3),
    });
    expect(supportedDisc(skin, 10)).toEqual({
      sagMm: expect.closeTo(0.656231, 5),
      stressMPa: expect.closeTo(34.8958, 3),
    });
    expect(clampedStrip(skin, 8)).toEqual({
      sagMm: expect.closeTo(0.0113043, 6),
      stressMPa: expect.closeTo(8.8889, 3),
    });
    expect(clampedPlate(skin, 8, 8)).toEqual({
      sagMm: expect.closeTo(0.0054926, 6),
      stressMPa: expect.closeTo(5.4756, 2),
    });
    expect(supportedRectangle(skin, 8, 8)).toEqual({
      sagMm: expect.closeTo(0.0176341, 6),
      stressMPa: expect.closeTo(5.3043, 3),
    });
    expect(supportedTriangle(skin, 8)).toEqual({
      sagMm: expect.closeTo(0.0044659, 6),
      stressMPa: expect.closeTo(2.6667, 3),
    });
  });

  it('ring collapse and ribs: Timoshenko and Gere (P17)', () => {
    expect(ringCollapseMPa(2300, 0.35, 1.2, 30)).toBeCloseTo(0.041937, 5);
    expect(ribBucklingMPa(2300, 0.35, 0.45, 8)).toBeCloseTo(27.2838, 3);
  });
});

describe('plates of any size', () => {
  it('Roark: supported square y = α q b⁴ / E h³, α = 0.0444 (P10); clamped centre by the same rigidity', () => {
    const answer = supportedRectangle(unit, 1, 1);
    // 12 (1 − ν²) D = E h³, with D = 1 here.
    expect(answer.sagMm * 12 * (1 - 0.09)).toBeCloseTo(0.04436, 4);
    expect(rigidity(skin)).toBeCloseTo(377.4359, 3);
  });

  it('a long supported plate is a beam: 5/384 and 1/8; clamped less than supported throughout', () => {
    const strip = supportedStrip(unit, 1);
    const long = supportedRectangle(unit, 1, 8);
    expect(long.sagMm / strip.sagMm).toBeCloseTo(1, 3);
    expect(strip.sagMm * 384).toBeCloseTo(5, 9);
    expect(moment(strip.stressMPa)).toBeCloseTo(1 / 8, 9);
    for (const other of [8, 11, 24])
      expect(clampedPlate(skin, 8, other).sagMm).toBeLessThan(supportedRectangle(skin, 8, other).sagMm);
    expect(clampedDisc(skin, 4).sagMm).toBeLessThan(supportedDisc(skin, 4).sagMm);
  });

  it.each([
    ['strip', (q: number, h: number, s: number, e: number) => clampedStrip({ ...skin, pressureMPa: q, thicknessMm: h, modulusMPa: e }, s)],
    ['disc', (q: number, h: number, s: number, e: number) => supportedDisc({ ...skin, pressureMPa: q, thicknessMm: h, modulusMPa: e }, s)],
    ['square', (q: number, h: number, s: number, e: number) => clampedPlate({ ...skin, pressureMPa: q, thicknessMm: h, modulusMPa: e }, s, s)],
    ['triangle', (q: number, h: number, s: number, e: number) => supportedTriangle({ ...skin, pressureMPa: q, thicknessMm: h, modulusMPa: e }, s)],
  ])('%s: sag goes with q s⁴ / E h³, stress with q s² / h² and no modulus', (_, plate) => {
    const base = plate(0.4, 1.2, 8, 2300);
    expect(plate(0.8, 1.2, 8, 4600)).toEqual({ sagMm: expect.closeTo(base.sagMm, 12), stressMPa: expect.closeTo(2 * base.stressMPa, 9) });
    expect(plate(0.4, 2.4, 8, 2300).sagMm / base.sagMm).toBeCloseTo(1 / 8, 9);
    expect(plate(0.4, 1.2, 16, 2300).sagMm / base.sagMm).toBeCloseTo(16, 9);
    expect(plate(0.4, 2.4, 16, 2300)).toEqual({ sagMm: expect.closeTo(2 * base.sagMm, 9), stressMPa: expect.closeTo(base.stressMPa, 9) });
  }); // prettier-ignore

  it.each([
    [1, 0.0229051, 0.0229051],
    [1.5, 0.036771, 0.020268],
    [2, 0.041155, 0.015808],
  ])('clamped, sides 1 : %f: moments at the middle, ν = 0.3 (P7)', (aspect, across, along) => {
    const { centre } = clampedRectangle(aspect);
    expect(centre.across + 0.3 * centre.along).toBeCloseTo(across, 5);
    expect(centre.along + 0.3 * centre.across).toBeCloseTo(along, 5);
  });

  it('refuses sides the wrong way round', () => {
    expect(() => clampedRectangle(0.5)).toThrow(/longer over the shorter/);
    expect(() => clampedRectangle(NaN)).toThrow(RangeError);
  });

  it('refuses a plate without thickness or modulus', () => {
    expect(() => clampedStrip({ ...skin, thicknessMm: 0 }, 8)).toThrow(
      /give a thickness and modulus above 0/,
    );
    expect(() => clampedDisc({ ...skin, modulusMPa: NaN }, 8)).toThrow(RangeError);
    expect(() => clampedDisc({ ...skin, poisson: 0.6 }, 8)).toThrow(/ratio of −1 to 0.5/);
  });
});

describe('infill cells', () => {
  it('grid cell 6 mm (P18), triangle side 10.3923 mm (P19), gyroid period 7.368 mm (P20), lines 3 mm at 15 %', () => {
    expect(infillCellMm('grid', 0.45, 0.15)).toBeCloseTo(6, 9);
    expect(infillCellMm('triangles', 0.45, 0.15)).toBeCloseTo(10.3923, 4);
    expect(Math.abs(infillCellMm('gyroid', 0.45, 0.15) / 7.368 - 1)).toBeLessThan(0.01);
    expect(infillCellMm('lines', 0.45, 0.15)).toBeCloseTo(3, 9);
  });

  it.each([
    [0.1, 9, 15.588, 11.05],
    [0.2, 4.5, 7.794, 5.526],
    [0.4, 2.25, 3.897, 2.763],
  ])('at %f: grid, triangle side, gyroid period', (density, grid, side, period) => {
    expect(infillCellMm('grid', 0.45, density)).toBeCloseTo(grid, 9);
    expect(infillCellMm('triangles', 0.45, density)).toBeCloseTo(side, 3);
    expect(infillCellMm('gyroid', 0.45, density)).toBeCloseTo(period, 2);
  });

  it('refuses a line without width or more than solid', () => {
    expect(() => infillSpanMm('grid', 0, 0.2)).toThrow(/line above 0 mm/);
    expect(() => infillSpanMm('grid', 0.45, 1.2)).toThrow(/share up to 1/);
  });
});

describe('infill: line distance as common open slicers define it', () => {
  it.each([
    ['lines', 0.1, 4.05],
    ['lines', 0.2, 1.8],
    ['grid', 0.15, 6],
    ['triangles', 0.15, 6],
    ['gyroid', 0.15, 3.684],
  ] as const)('%s at %f: span', (pattern, density, span) => {
    expect(infillSpanMm(pattern, 0.45, density)).toBeCloseTo(span, 3);
    expect(densityForSpan(pattern, 0.45, span)).toBeCloseTo(density, 3);
  });

  it('nothing carries without infill, nothing is free when solid', () => {
    expect(infillSpanMm('grid', 0.45, 0)).toBe(Infinity);
    expect(infillSpanMm('grid', 0.45, 1)).toBe(0);
  });
});
