import { describe, expect, it } from 'vitest';
import {
  contactC,
  coolingTimeS,
  effusivity,
  toolC,
  type ThermalBody,
} from '@/lib/formability/physics/conduction';
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

  it('agrees with an implicit finite-difference run over sheet and tool, made here', () => {
    expect(Math.abs(finiteDifference(10) - toolC(laid, 10))).toBeLessThan(0.2);
    expect(Math.abs(finiteDifference(30) - toolC(laid, 30))).toBeLessThan(0.2);
  });

  it('starts at the contact temperature and ends cold', () => {
    expect(toolC(laid, 1e-3)).toBeCloseTo(contactC(hips, 150, pla, 25), 6);
    expect(toolC(laid, 1e7)).toBeLessThan(26);
    expect(toolC(laid, 0)).toBe(25);
  });

  it('cooling of a 1 mm HIPS sheet from 150 to 80 °C on a tool of 40 °C (H17)', () => {
    expect(coolingTimeS(hips, 1, { sheetC: 150, toolC: 40, demouldC: 80 })).toBeCloseTo(6.3327, 3);
    expect(() => coolingTimeS(hips, 1, { sheetC: 150, toolC: 90, demouldC: 80 })).toThrow(RangeError);
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

/** Interface temperature by implicit steps: a 1 mm sheet, insulated above, on 40 mm of tool; 50 µm cells. */
function finiteDifference(time: number): number {
  const dx = 5e-5;
  const inSheet = 20;
  const cells = inSheet + 800;
  const dt = 0.02;
  const body = (i: number) => (i < inSheet ? hips : pla);
  let t = Float64Array.from({ length: cells }, (_, i) => (i < inSheet ? 150 : 25));
  const link = (i: number) => {
    const [a, b] = [body(i).conductivityWmK, body(i + 1).conductivityWmK];
    return (2 * a * b) / (a + b) / dx;
  };
  for (let step = 0; step < Math.round(time / dt); step++) {
    const c = new Float64Array(cells);
    const d = new Float64Array(cells);
    for (let i = 0; i < cells; i++) {
      const store = (body(i).densityKgM3 * body(i).heatJkgK * dx) / dt;
      const up = i > 0 ? link(i - 1) : 0;
      const down = i + 1 < cells ? link(i) : 0;
      const pivot = store + up + down - up * (i > 0 ? -c[i - 1] : 0);
      c[i] = -down / pivot;
      d[i] = (store * t[i] + up * (i > 0 ? d[i - 1] : 0)) / pivot;
    }
    const next = new Float64Array(cells);
    for (let i = cells - 1; i >= 0; i--) next[i] = d[i] - (i + 1 < cells ? c[i] * next[i + 1] : 0);
    t = next;
  }
  const [ks, kt] = [hips.conductivityWmK, pla.conductivityWmK];
  return (ks * t[inSheet - 1] + kt * t[inSheet]) / (ks + kt);
}
