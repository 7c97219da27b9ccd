import { describe, expect, it } from 'vitest';
import { clampedRectangle } from '@/lib/formability/physics/clamped-rectangle';
import { densityForSpan, infillSpanMm } from '@/lib/formability/physics/infill';
import {
  clampedDisc,
  clampedPlate,
  clampedStrip,
  ribBucklingMPa,
  ringCollapseMPa,
  supportedDisc,
  supportedRectangle,
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
