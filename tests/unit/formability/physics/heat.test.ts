import { describe, expect, it } from 'vitest';
import {
  contactC,
  coolingTimeS,
  effusivity,
  toolC,
  type ThermalBody,
} from '@/lib/formability/physics/conduction';
import { prepareStep, takeStep } from '@/lib/formability/physics/conduct';
import { erf, erfc } from '@/lib/formability/physics/erf';
import { halfSpaceRiseK, heatOfPull, lumpedRiseK } from '@/lib/formability/physics/cycle-heating';

const pla: ThermalBody = { conductivityWmK: 0.17, densityKgM3: 1240, heatJkgK: 1600 };
const aluminium: ThermalBody = { conductivityWmK: 205, densityKgM3: 2700, heatJkgK: 900 };
const hips: ThermalBody = { conductivityWmK: 0.16, densityKgM3: 1050, heatJkgK: 1900 };
const petg: ThermalBody = { conductivityWmK: 0.2, densityKgM3: 1270, heatJkgK: 1750 };

describe('error function: Abramowitz and Stegun, table 7.1', () => {
  it.each([
    [0.1, 0.8875370839817],
    [0.5, 0.4795001221869],
    [1, 0.1572992070502],
    [1.4999, 0.03390675],
    [1.5001, 0.03388296],
    [2, 0.004677734981],
    [-1, 1.8427007929497],
  ])('erfc(%f)', (x, value) => {
    expect(erfc(x)).toBeCloseTo(value, 7);
    expect(erf(x)).toBeCloseTo(1 - value, 7);
  });

  it('does not jump where the series gives way to the fraction', () => {
    expect(Math.abs(erfc(1.5 - 1e-12) - erfc(1.5 + 1e-12))).toBeLessThan(1e-12);
    expect(Math.abs(erfc(-1.5 - 1e-12) - erfc(-1.5 + 1e-12))).toBeLessThan(1e-12);
  });
});

describe('a step at the surface of a thick body: erf(x / 2√(αt)), textbook example of Incropera and DeWitt (H5, H6)', () => {
  it('soil of 20 °C below a surface at −15 °C freezes down to 0.68 m in 60 days', () => {
    expect(erfc(0.5)).toBeCloseTo(0.47950012, 8);
    const eta = 0.4001862;
    expect(erf(eta)).toBeCloseTo(15 / 35, 6);
    expect(2 * eta * Math.sqrt(0.138e-6 * 60 * 86_400)).toBeCloseTo(0.676962, 5);
  });
});

describe('contact: Incropera and DeWitt; Carslaw and Jaeger', () => {
  it('effusivity of a solid PLA template (H1)', () => expect(effusivity(pla)).toBeCloseTo(580.7581, 3));

  it.each([
    ['H2', hips, 150, pla, 25, 86.6392],
    ['H3', hips, 150, aluminium, 25, 28.0861],
    ['H4', petg, 140, pla, 30, 88.7895],
    ['warm', hips, 150, pla, 45, 96.7769],
  ] as const)('contact temperature (%s)', (_, sheet, sheetC, tool, toolAtC, value) => {
    expect(contactC(sheet, sheetC, tool, toolAtC)).toBeCloseTo(value, 3);
  });

  const laid = { sheet: hips, tool: pla, thicknessMm: 1, sheetC: 150, toolC: 25 };
  it.each([
    [1, 86.6391],
    [5, 85.0438],
    [10, 79.4982],
    [30, 64.0827],
    [60, 54.369],
  ])('interface below a 1 mm sheet after %i s (H14, H15: exact image series)', (time, value) => {
    expect(toolC(laid, time)).toBeCloseTo(value, 3);
  });

  it.each([
    [0.5, 65.1859],
    [1, 51.2301],
    [2, 32.6833],
  ])('tool %f mm down after 10 s (H16)', (depth, value) =>
    expect(toolC(laid, 10, depth)).toBeCloseTo(value, 3),
  );

  it('the solver that follows the pulls agrees within 0.2 K: interface and 1 mm down (H14, H15, H16)', () => {
    const after = [10, 60].map((time) => solve(time));
    expect(Math.abs(after[0].interfaceC - 79.4982)).toBeLessThan(0.2);
    expect(Math.abs(after[1].interfaceC - 54.369)).toBeLessThan(0.2);
    expect(Math.abs(after[0].at(1) - 51.2301)).toBeLessThan(0.2);
    for (const depth of [0.3, 0.5, 2, 3.7])
      expect(Math.abs(after[0].at(depth) - toolC(laid, 10, depth))).toBeLessThan(0.2);
  });

  it('starts at the contact temperature and ends cold', () => {
    expect(toolC(laid, 1e-3)).toBeCloseTo(contactC(hips, 150, pla, 25), 6);
    expect(toolC(laid, 1e7)).toBeLessThan(26);
    expect(toolC(laid, 0)).toBe(25);
  });

  it('cooling of a 1 mm HIPS sheet from 150 to 80 °C on a tool of 40 °C (H17)', () => {
    expect(coolingTimeS(hips, 1, { sheetC: 150, toolC: 40, demouldC: 80 })).toBeCloseTo(6.3327, 3);
    expect(() => coolingTimeS(hips, 1, { sheetC: 150, toolC: 90, demouldC: 80 })).toThrow(/does not cool it/);
    expect(() => coolingTimeS(hips, 0, { sheetC: 150, toolC: 40, demouldC: 80 })).toThrow(/above 0/);
    expect(coolingTimeS(hips, 1, { sheetC: 70, toolC: 40, demouldC: 80 })).toBe(0);
  });
});

describe('heat of many pulls: pulses on a half-space and on a lump, derived', () => {
  const heatJm2 = heatOfPull(hips, 1, 150, 80);
  const cycling = { tool: pla, shellMm: 4, heatJm2, cycleS: 60 };

  it('1 mm HIPS from 150 to 80 °C leaves 139,650 J/m²', () => expect(heatJm2).toBeCloseTo(139650, 6));

  it.each([
    [1, 17.5144],
    [5, 56.6007],
    [10, 87.9397],
    [20, 133.0263],
  ])('half-space just before pull %i + 1 (H18)', (pulls, rise) => {
    expect(halfSpaceRiseK(cycling, pulls)).toBeCloseTo(rise, 3);
  });

  it.each([
    [5, 71.0354],
    [10, 111.327],
    [20, 147.1432],
    [1e6, 164.1314],
  ])('lumped 4 mm shell after pull %i (H19)', (pulls, rise) => {
    expect(lumpedRiseK(cycling, pulls)).toBeCloseTo(rise, 3);
  });
});

/** A 1 mm HIPS sheet at 150 °C, insulated above, on 40 mm of PLA at 25 °C, by the product's solver; 50 µm cells. */
function solve(time: number): { interfaceC: number; at(depthMm: number): number } {
  const [inSheet, cells] = [20, 820];
  const of = (value: (body: ThermalBody) => number) =>
    Float64Array.from({ length: cells }, (_, i) => value(i < inSheet ? hips : pla));
  const rod = {
    widthM: of(() => 5e-5),
    conductivityWmK: of((body) => body.conductivityWmK),
    capacityJm3K: of((body) => body.densityKgM3 * body.heatJkgK),
  };
  const t = new Float64Array(cells).fill(25).fill(150, 0, inSheet);
  const step = prepareStep(rod, time / 200, null, null);
  for (let k = 0; k < 200; k++) takeStep(step, t);
  const [ks, kt] = [hips.conductivityWmK, pla.conductivityWmK];
  return {
    interfaceC: (ks * t[inSheet - 1] + kt * t[inSheet]) / (ks + kt),
    at: (depthMm) => {
      const place = inSheet + depthMm / 0.05 - 0.5;
      const i = Math.floor(place);
      return t[i] + (place - i) * (t[i + 1] - t[i]);
    },
  };
}
