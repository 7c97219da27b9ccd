import { describe, expect, it } from 'vitest';
import {
  bulgeMm,
  cuspMm,
  layerForCusp,
  nubDraftDeg,
  roughnessUm,
  shareThrough,
  stepThroughMm,
  treadMm,
} from '@/lib/formability/physics/layer-surface';

describe('steps of printed layers: A. Dolenc, I. Mäkelä 1994; geometry', () => {
  // Draft is 90° less the slope from horizontal.
  it('cusp on slopes of 60° and 85° (S1, S2), tread at 3° of draft (S3)', () => {
    expect(cuspMm(0.2, 30)).toBeCloseTo(0.1, 9);
    expect(cuspMm(0.2, 5)).toBeCloseTo(0.017431, 6);
    expect(treadMm(0.2, 3)).toBeCloseTo(0.0104816, 7);
    expect(treadMm(0.2, 90)).toBe(Infinity);
  });

  it.each([
    [5, 0.0175, 0.01743],
    [10, 0.03527, 0.03473],
    [30, 0.11547, 0.1],
    [45, 0.2, 0.14142],
    [60, 0.34641, 0.17321],
    [80, 1.13426, 0.19696],
  ])('table of layers of 0.2 mm at %f° of draft', (draft, tread, cusp) => {
    expect(treadMm(0.2, draft)).toBeCloseTo(tread, 5);
    expect(cuspMm(0.2, draft)).toBeCloseTo(cusp, 5);
  });

  it('roughness: a quarter of the cusp on a slope (S4), the rounding of the beads on a wall (S5)', () => {
    expect(roughnessUm(0.2, 45)).toBeCloseTo(35.3553, 3);
    expect(roughnessUm(0.2, 0)).toBeCloseTo(18.1303, 3);
    expect(roughnessUm(0.4, 0)).toBeCloseTo(2 * 18.1303, 3);
  });

  it('layer for a permitted cusp (S6), as thick as the printer takes where the slope is none', () => {
    expect(layerForCusp(0.05, 30, 0.3)).toBeCloseTo(0.1, 9);
    expect(layerForCusp(0.05, 10, 0.3)).toBeCloseTo(0.2879, 4);
    expect(layerForCusp(0.05, 0, 0.3)).toBe(0.3);
    for (const draft of [8, 27, 55, 88])
      expect(cuspMm(layerForCusp(0.04, draft, 9), draft)).toBeCloseTo(0.04, 12);
  });

  it('micro-undercut: draft that clears a nub (S8), and how deep a hot sheet bulges between beads', () => {
    expect(nubDraftDeg(0.2, 0.01)).toBeCloseTo(2.86241, 5);
    expect(nubDraftDeg(0.2, 0.005)).toBeCloseTo(1.4321, 4);
    expect(bulgeMm(0.2, 0.4, 1, 3)).toBeCloseTo(0.0024, 6);
    expect(bulgeMm(0.2, 0.8, 1, 6)).toBeCloseTo(0.0024, 6);
    expect(bulgeMm(0.2, 0.4, 2, 3)).toBeCloseTo(0.0012, 6);
  });
});

describe('a wave through an incompressible sheet that sticks to it (derived)', () => {
  it('solves the equations of the layer: sticks below, free of stress above', () => {
    for (const K of [0.3, 1, 2.5]) {
      // W = (1 + B z) cosh z + (−B + D z) sinh z, z from 0 to K; W is the height, W′ the slip along.
      const [c, s] = [Math.cosh(K), Math.sinh(K)];
      const B = (s * c - K) / (K * K + c * c);
      const D = (B - ((1 + B * K) * s) / c) / K;
      const [even, odd] = [1 + B * K, -B + D * K];
      const W = even * c + odd * s;
      const second = W + 2 * B * s + 2 * D * c;
      const first = even * s + odd * c + B * c + D * s;
      const third = even * s + odd * c + 3 * (B * c + D * s);
      expect(second + W).toBeCloseTo(0, 12);
      expect(third - 3 * first).toBeCloseTo(0, 12);
      expect(shareThrough(K, 2 * Math.PI)).toBeCloseTo(W, 12);
    }
  });

  it('a thin sheet shows all, a thick one nothing; more sheet shows less', () => {
    expect(shareThrough(1e-6, 1)).toBeCloseTo(1, 9);
    expect(shareThrough(5, 0.1)).toBeLessThan(1e-60);
    expect(shareThrough(1e9, 1e-9)).toBe(0);
    for (let t = 0.1; t < 3; t += 0.1) expect(shareThrough(t + 0.1, 1)).toBeLessThan(shareThrough(t, 1));
  });

  it('steep walls hide their fine steps, shallow tops show them', () => {
    expect(stepThroughMm(0.2, 5, 0.5)).toBeLessThan(1e-12);
    expect(stepThroughMm(0.2, 85, 0.5)).toBeGreaterThan(0.1);
    expect(stepThroughMm(0.2, 0, 0.5)).toBe(0);
    expect(stepThroughMm(0.2, 90, 0.5)).toBeCloseTo(0.2, 9);
    // Half of everything is half the step.
    expect(stepThroughMm(0.1, 80, 0.25)).toBeCloseTo(stepThroughMm(0.2, 80, 0.5) / 2, 12);
  });
});
