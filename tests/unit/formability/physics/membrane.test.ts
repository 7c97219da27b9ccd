import { describe, expect, it } from 'vitest';
import { inflateMembrane, LIMIT_STRETCH, stateAtPressure } from '@/lib/formability/physics/inflate-membrane';

// Rows M1 to M10 and M12 here; M11, another law, is held by the membrane's own reference in sheet/inflate-disc.test.ts.
describe('inflation of a clamped disc: Adkins and Rivlin 1952, neo-Hookean', () => {
  it.each([
    [1.0065354, 0.1, 0.0276426, 0.987056, 0.992105],
    [1.0414452, 0.25, 0.3696941, 0.921992, 0.954491],
    [1.1755714, 0.5, 1.8012769, 0.723606, 0.860922],
    [1.4328108, 0.75, 3.121567, 0.487105, 0.785506],
    [1.8355883, 1, 3.6798648, 0.29679, 0.744732],
    [2.3727165, 1.25, 3.747383, 0.177627, 0.724779],
    [3.0319477, 1.5, 3.6074267, 0.108782, 0.714376],
    [4.7058288, 2, 3.1665375, 0.045157, 0.704702],
  ])(
    'pole stretch %f: height %f, pressure, thickness of pole and edge (M1 to M9)',
    (stretch, height, pressure, pole, edge) => {
      const state = inflateMembrane(stretch);
      expect(state.height).toBeCloseTo(height, 5);
      expect(Math.abs(state.pressure / pressure - 1)).toBeLessThan(1e-5);
      expect(state.poleThickness).toBeCloseTo(pole, 5);
      expect(state.edgeThickness).toBeCloseTo(edge, 5);
    },
  );

  it('pressure has its highest value at the limit stretch, h/a = 1.17390 (M10)', () => {
    const top = inflateMembrane(LIMIT_STRETCH);
    expect(top.pressure).toBeCloseTo(3.7583469, 6);
    expect(top.height).toBeCloseTo(1.1738969, 5);
    expect(inflateMembrane(LIMIT_STRETCH - 0.02).pressure).toBeLessThan(top.pressure);
    expect(inflateMembrane(LIMIT_STRETCH + 0.02).pressure).toBeLessThan(top.pressure);
  });

  it('a small blister follows Hencky: w = 0.594879 a (p a / E t)^(1/3) (M12)', () => {
    const state = inflateMembrane(1.0002);
    // P = p a / C₁ t with C₁ = E / 6.
    expect(state.height / (state.pressure / 6) ** (1 / 3)).toBeCloseTo(0.594879, 3);
  });

  it.each([1.1, 1.5, 2, 3])(
    'thins most at the pole, whose thickness is the stretch to the power −2 (%f)',
    (stretch) => {
      const { poleThickness, edgeThickness } = inflateMembrane(stretch);
      expect(poleThickness).toBeCloseTo(stretch ** -2, 12);
      expect(edgeThickness).toBeGreaterThan(poleThickness);
    },
  );

  it.each([
    [0.1, 0.15573],
    [0.3, 0.23115],
    [1, 0.374299],
    [2, 0.531214],
  ])('height at pressure %f (A10)', (pressure, height) =>
    expect(stateAtPressure(pressure)?.height).toBeCloseTo(height, 4),
  );

  it.each([0.02, 0.7, 2.6, 3.7])('a state found for pressure %f has it', (pressure) => {
    const state = stateAtPressure(pressure);
    expect((state?.pressure ?? 0) / pressure).toBeCloseTo(1, 6);
    expect(state?.poleThickness).toBeCloseTo((state?.poleStretch ?? 0) ** -2, 12);
  });

  it('flat without pressure, burst above the limit', () => {
    expect(stateAtPressure(0)).toMatchObject({ height: 0, poleThickness: 1 });
    expect(stateAtPressure(3.76)).toBeNull();
  });
});
