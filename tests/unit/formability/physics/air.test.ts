import { describe, expect, it } from 'vitest';
import {
  boreFlow,
  chokedEvacuationS,
  CRITICAL_RATIO,
  expelTimeS,
  flowFunction,
  laminarFlow,
  orificeFlow,
} from '@/lib/formability/physics/gas-flow';
import { heightAtPressure, inflateMembrane, LIMIT_STRETCH } from '@/lib/formability/physics/inflate-membrane';

const room = { upstreamPa: 101_325, downstreamPa: 0, kelvin: 293.15 };
const circle = (d: number) => (Math.PI / 4) * d * d;

describe('gas flow: standard gas dynamics, form of ISO 9300; Hagen and Poiseuille', () => {
  it('critical ratio and flow functions (A1, A2, A11)', () => {
    expect(CRITICAL_RATIO).toBeCloseTo(0.5282818, 7);
    expect(flowFunction(0.1)).toBeCloseTo(0.6847315, 7);
    expect(flowFunction(0.9)).toBeCloseTo(0.4225809, 7);
    expect(flowFunction(0.8)).toBeCloseTo(0.560661, 7);
    expect(flowFunction(0.6)).toBeCloseTo(0.6769153, 7);
    expect(flowFunction(1)).toBe(0);
  });

  it('orifices (A3, A4)', () => {
    expect(orificeFlow(circle(1), 1, room)).toBeCloseTo(1.878465e-4, 9);
    expect(orificeFlow(circle(0.5), 0.6, room)).toBeCloseTo(2.817697e-5, 9);
    expect(orificeFlow(circle(1), 1, { ...room, downstreamPa: 0.8 * 101_325 })).toBeCloseTo(1.538095e-4, 9);
  });

  it('long bores are laminar, wide ones are not (A8)', () => {
    const at = { ...room, downstreamPa: 20_000 };
    expect(laminarFlow({ diameterMm: 0.2, lengthMm: 20 }, at)).toBeCloseTo(6.32492e-6, 10);
    expect(boreFlow({ diameterMm: 0.2, lengthMm: 20 }, 0.6, at)).toEqual({
      kgS: expect.closeTo(4.5083e-6, 9),
      regime: 'choked',
    });
    expect(boreFlow({ diameterMm: 0.2, lengthMm: 40 }, 0.6, at).regime).toBe('laminar');
    expect(boreFlow({ diameterMm: 0.4, lengthMm: 10 }, 1, at)).toEqual({
      kgS: expect.closeTo(3.0055e-5, 8),
      regime: 'choked',
    });
    expect(boreFlow({ diameterMm: 1, lengthMm: 0 }, 1, { ...room, downstreamPa: 81_060 }).regime).toBe(
      'subcritical',
    );
  });

  it('time to empty: 5 cm³ through 0.6 mm; 50 cm³ through eight holes of 0.8 mm (A5, A6)', () => {
    expect(expelTimeS(5000, orificeFlow(circle(0.6), 0.6, room), room)).toBeCloseTo(0.148382, 6);
    expect(expelTimeS(50_000, orificeFlow(8 * circle(0.8), 0.8, room), room)).toBeCloseTo(0.078249, 6);
    expect(
      chokedEvacuationS(50_000, 8 * circle(0.8), 0.8, { fromPa: 101_325, toPa: 20_000, kelvin: 293.15 }),
    ).toBeCloseTo(0.126966, 6);
  });
});

describe('inflation of a clamped disc: Adkins and Rivlin 1952, neo-Hookean', () => {
  it.each([
    [1.0414452, 0.25, 0.3696941, 0.921992, 0.954491],
    [1.1755714, 0.5, 1.8012769, 0.723606, 0.860922],
    [1.4328108, 0.75, 3.121567, 0.487105, 0.785506],
    [1.8355883, 1, 3.6798648, 0.29679, 0.744732],
    [3.0319477, 1.5, 3.6074267, 0.108782, 0.714376],
    [4.7058288, 2, 3.1665375, 0.045157, 0.704702],
  ])(
    'pole stretch %f: height %f, pressure, thickness of pole and edge (M1 to M9)',
    (stretch, height, pressure, pole, edge) => {
      const state = inflateMembrane(stretch);
      expect(state.height).toBeCloseTo(height, 5);
      expect(state.pressure).toBeCloseTo(pressure, 5);
      expect(state.poleThickness).toBeCloseTo(pole, 5);
      expect(state.edgeThickness).toBeCloseTo(edge, 5);
    },
  );

  it('pressure has its highest value at the limit stretch (M10)', () => {
    const top = inflateMembrane(LIMIT_STRETCH).pressure;
    expect(top).toBeCloseTo(3.7583469, 6);
    expect(inflateMembrane(LIMIT_STRETCH - 0.02).pressure).toBeLessThan(top);
    expect(inflateMembrane(LIMIT_STRETCH + 0.02).pressure).toBeLessThan(top);
  });

  it('a small blister follows Hencky: w = 0.594879 a (p a / E t)^(1/3) (M12)', () => {
    const state = inflateMembrane(1.0002);
    // P = p a / C₁ t with C₁ = E / 6.
    expect(state.height / (state.pressure / 6) ** (1 / 3)).toBeCloseTo(0.594879, 3);
  });

  it.each([
    [0.1, 0.15573],
    [0.3, 0.23115],
    [1, 0.374299],
    [2, 0.531214],
  ])('height at pressure %f (A10)', (pressure, height) =>
    expect(heightAtPressure(pressure)).toBeCloseTo(height, 4),
  );

  it('flat without pressure, burst above the limit', () => {
    expect(heightAtPressure(0)).toBe(0);
    expect(heightAtPressure(3.76)).toBeNull();
  });
});
