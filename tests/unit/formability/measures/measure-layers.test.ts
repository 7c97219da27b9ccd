import { describe, expect, it } from 'vitest';
import { printedDiameter } from '@/lib/formability/measures/find-vents';
import { innerVolume } from '@/lib/formability/measures/estimate-print';
import { dome, frustum } from '../../../fixtures/meshes/solids';
import { checkOf, reportOn } from '../run-engine';

const rad = Math.PI / 180;
const coarse = { cellMm: 0.5 };
const layersOf = (draft: number | [number, number, number, number], layerMm: number, more = {}) =>
  reportOn(frustum(120, 90, 20, draft), { grid: coarse, print: { layerMm }, ...more }).layers;

describe('cusp = layer × |n_z| (A. Dolenc, I. Mäkelä 1994), tread = layer × tan(draft)', () => {
  it('row S1: layer 0.2, slope 60° from horizontal: cusp 0.1', () => {
    expect(layersOf(30, 0.2).cuspMaxMm).toBeCloseTo(0.1, 6);
  });

  it('row S2: layer 0.2, slope 85°: cusp 0.017431', () => {
    expect(layersOf(5, 0.2).cuspMaxMm).toBeCloseTo(0.017431, 6);
  });

  it('row S3: layer 0.2, draft 3°: tread 0.0104816', () => {
    expect(layersOf(3, 0.2).treadMinMm).toBeCloseTo(0.0104816, 6);
  });

  it('row S8: groove 0.010, layer 0.2: least layer draft 2.86241°', () => {
    expect(layersOf(5, 0.2, { limits: { layerGrooveMm: 0.01 } }).layerDraftDeg).toBeCloseTo(2.86241, 4);
    expect(layersOf(5, 0.2, { limits: { layerGrooveMm: 0.005 } }).layerDraftDeg).toBeCloseTo(1.4321, 4);
  });

  it('the median is weighted by area: three walls of 10°, one of 30°, a flat top that has no step', () => {
    const found = layersOf([30, 10, 10, 10], 0.2);
    expect(found.cuspMaxMm).toBeCloseTo(0.2 * Math.sin(30 * rad), 6);
    expect(found.cuspMedianMm).toBeCloseTo(0.2 * Math.sin(10 * rad), 6);
    expect(found.treadMinMm).toBeCloseTo(0.2 * Math.tan(10 * rad), 6);
  });

  it('half of a dome lies below half of its height: median cusp = layer / 2 (Archimedes)', () => {
    const { layers } = reportOn(dome(40, 128, 128), { grid: coarse, print: { layerMm: 0.2 } });
    expect(layers.cuspMedianMm).toBeCloseTo(0.1, 2);
  });

  it('row S6 as a remedy: cusp 0.05 on a slope of 60° asks for layers of 0.1', () => {
    const report = reportOn(frustum(120, 90, 20, 30), { grid: coarse, print: { layerMm: 0.3 }, limits: { cuspMaxMm: 0.05, layerMaxMm: 0.3 } }); // prettier-ignore
    expect(checkOf(report, 'layers').status).toBe('caution');
    expect(checkOf(report, 'layers').remedy).toContain('layers of 0.1 mm');
    const mended = reportOn(frustum(120, 90, 20, 30), { grid: coarse, print: { layerMm: 0.1 }, limits: { cuspMaxMm: 0.05 } }); // prettier-ignore
    expect(checkOf(mended, 'layers').status).toBe('pass');
  });
});

describe('print estimate (block 100 × 80 × 30, 3 walls × 0.45, 4 + 4 layers × 0.2, 20 %)', () => {
  const block = {
    volumeMm3: 240_000,
    heightMm: 30,
    wallAreaMm2: 10_800,
    topAreaMm2: 8000,
    bottomAreaMm2: 8000,
  };
  const report = reportOn(frustum(100, 80, 30, 0), {
    grid: coarse,
    print: { material: 'pla', layerMm: 0.2, shellMm: 1.35, topMm: 0.8, infillPercent: 20 },
  });

  it('the inner volume is 97.3 × 77.3 × 28.4 to 0.02 %', () => {
    expect(Math.abs(innerVolume(block, 1.35, 0.8) / (97.3 * 77.3 * 28.4) - 1)).toBeLessThan(2e-4);
  });

  it('row Q3: material 69116.29 mm³ to 0.1 %; 85.70 g; row Q5: 28.7352 m of 1.75 mm; 150 layers', () => {
    expect(Math.abs(report.print.materialMm3 / 69_116.291 - 1)).toBeLessThan(1e-3);
    expect(report.print.massG).toBeCloseTo(85.7, 0);
    expect(Math.abs(report.print.filamentM / 28.7352 - 1)).toBeLessThan(1e-3);
    expect(report.print.layers).toBe(150);
  });

  it('row Q4: 5.07909 h of laying at 5.4 mm³/s (row Q1: 0.45 × 0.2 × 60) and 70 %, and 2 s a layer', () => {
    expect(Math.abs((report.print.timeS - 150 * 2) / 3600 / 5.07909 - 1)).toBeLessThan(1e-3);
    const { costs } = report.recipe;
    const expected =
      0.0857042 * costs.materialPerKg + (5.07909 + 300 / 3600) * costs.machinePerHour + costs.labour;
    expect(Math.abs(report.print.cost / expected - 1)).toBeLessThan(1e-3);
  });
});

describe('hole model', () => {
  it('row F4: the coupon line a = −0.2514414, b = 1.0187838 prints 0.8 mm from a nominal of 1.032056', () => {
    const model = { slope: 1.0187838, offsetMm: -0.2514414, minOpenMm: 0.4 };
    expect(printedDiameter(1.032056, model)).toBeCloseTo(0.8, 5);
  });
});
