import { describe, expect, it } from 'vitest';
import type { RecipeInput } from '@/lib/formability/recipe';
import { markIn } from '@/lib/formability/measures/estimate-vent-marks';
import { carved, rectangle, turnedRing } from '../../../fixtures/meshes/carved';
import { checkOf, reportOn } from '../run-engine';

/** Pockets and their ways out: flow by gas dynamics, marks by the membrane; sources in the physics tests. */

const coarse = { grid: { cellMm: 0.4 } } satisfies RecipeInput;
const exact = {
  ...coarse,
  print: { holeModel: { slope: 1, offsetMm: 0, minOpenMm: 0.4 } },
} satisfies RecipeInput;
const block = rectangle(80, 60);

/** A block 30 high with a pit 40 × 30 down to z 10, and round bores of a diameter from its floor to the bed. */
function pit(diameter: number, places: [number, number][] = [[0, 0]]) {
  const bores = places.map(([x, y]) => ({ ring: turnedRing(diameter / 2, 32, x, y), z: 0 }));
  return carved(block, 30, [{ ring: rectangle(40, 30), z: 10, pockets: diameter > 0 ? bores : [] }]);
}

describe('air', () => {
  it('24 cm³ through one bore of 1 mm, 10 mm long: choked at 1 bar over the air below, by hand', () => {
    const { air } = reportOn(pit(1), exact);
    expect(air).toHaveLength(1);
    // τ = V / (C_d A C* √(RT)), √(287.05 · 296.15) = 291.56 m/s; the bore's circle has 1 mm.
    const area = Math.PI / 4;
    const tau = 24e-6 / (0.6 * area * 1e-6 * 0.6847315 * 291.564);
    expect(air[0]).toMatchObject({ trap: 0, regime: 'choked' });
    expect(air[0].ventAreaMm2).toBeCloseTo(area, 2);
    expect((air[0].clearS ?? 0) / tau).toBeCloseTo(1, 1);
    expect(Math.abs((air[0].clearS ?? 0) / tau - 1)).toBeLessThan(0.015);
  });

  it('flow adds up over vents; less pressure than the critical is subcritical; a narrow long bore is laminar', () => {
    const one = reportOn(pit(1), exact).air[0];
    const three = reportOn(pit(1, [[-10, 0], [0, 0], [10, 0]]), exact).air[0]; // prettier-ignore
    expect((one.clearS ?? 0) / (three.clearS ?? 1)).toBeCloseTo(3, 1);
    expect(reportOn(pit(1), { ...exact, machine: { pressureBar: 0.5 } }).air[0].regime).toBe('subcritical');
    const tiny = { ...coarse, print: { holeModel: { slope: 0.1, offsetMm: 0, minOpenMm: 0.05 } } };
    expect(reportOn(pit(0.8), tiny).air[0].regime).toBe('laminar');
  });

  it('the vents that it asks for clear the pocket in time, one fewer would not', () => {
    const report = reportOn(pit(0), exact);
    const [flow] = report.air;
    expect(flow).toMatchObject({ clearS: null, ventAreaMm2: 0, ventDiameterMm: 0.4 });
    expect(flow.ventPlaces).toHaveLength(flow.ventsNeeded);
    expect(checkOf(report, 'air').status).toBe('fail');
    const drilled = (n: number) =>
      reportOn(
        pit(
          0.4,
          flow.ventPlaces.slice(0, n).map(([x, y]) => [x, y]),
        ),
        exact,
      );
    expect(drilled(flow.ventsNeeded).air[0].clearS).toBeLessThanOrEqual(0.5);
    expect(checkOf(drilled(flow.ventsNeeded), 'air').status).toBe('pass');
    expect(drilled(flow.ventsNeeded - 1).air[0].clearS).toBeGreaterThan(0.5);
    expect(drilled(flow.ventsNeeded - 1).air[0].ventsNeeded).toBe(1);
  });

  it('places lie on the floor, clear of its walls, the first four in its corners', () => {
    const { ventPlaces } = reportOn(pit(0), exact).air[0];
    for (const [x, y, z] of ventPlaces) {
      expect(z).toBeCloseTo(10, 6);
      expect(Math.abs(x)).toBeLessThan(20 - 0.8);
      expect(Math.abs(y)).toBeLessThan(15 - 0.8);
    }
    const quarters = new Set(ventPlaces.slice(0, 4).map(([x, y]) => `${x > 0} ${y > 0}`));
    expect(quarters.size).toBe(4);
    for (const [x, y] of ventPlaces.slice(0, 4)) expect(Math.hypot(x, y)).toBeGreaterThan(21);
  });

  it('vents that the printer closes, or that end on a shut bed, let nothing out', () => {
    expect(reportOn(pit(0.5), coarse).air[0]).toMatchObject({ clearS: null, ventAreaMm2: 0 });
    expect(reportOn(pit(1), { ...coarse, machine: { ventedBed: false } }).air[0].clearS).toBeNull();
    const printed = reportOn(pit(1), coarse).air[0].ventAreaMm2;
    expect(printed).toBeCloseTo((Math.PI / 4) * 0.8 ** 2, 2);
  });

  it('a hole model that leaves nothing of a vent, and calls that open, leaves the pocket shut', () => {
    const shut = { ...coarse, print: { holeModel: { slope: 1, offsetMm: -3, minOpenMm: 0 } } };
    expect(reportOn(pit(1), shut).air[0]).toMatchObject({ clearS: null, fallS: null, ventAreaMm2: 0 });
  });

  it('a pocket that the sheet closes over empties through its vents too, by the fall of its pressure', () => {
    const [flow] = reportOn(pit(1), exact).air;
    // From 2.01 to 1.11 bar absolute: nearly all of it subcritical, a little more than the time at constant pressure.
    expect(flow.fallS).toBeGreaterThan(0.5 * (flow.clearS ?? Infinity));
    expect(flow.fallS).toBeLessThan(2 * (flow.clearS ?? 0));
  });

  it('without a pocket there is nothing to clear', () => {
    const report = reportOn(carved(block, 30, []), coarse);
    expect(report.air).toEqual([]);
    expect(checkOf(report, 'air')).toMatchObject({ status: 'pass', measured: 0 });
  });
});

describe('vent marks', () => {
  it('thin sheet over a bore of 1 mm: 0.2656 mm (membrane); thick: 0.0343 mm (plate with shear)', () => {
    const thin = markIn(0.4, 0.5, 0.2);
    expect(thin.heightMm).toBeCloseTo(0.2656, 3);
    expect(thin.tipMm).toBeCloseTo(0.2 * 0.694, 3);
    expect(markIn(0.4, 0.4, 0.6)).toEqual({ heightMm: expect.closeTo(0.00222 + 0.032, 4), tipMm: 0.6 });
  });

  it('a sheet that nothing holds goes as deep as the bore is wide', () => {
    expect(markIn(2, 0.5, 0.1)).toEqual({ heightMm: 1, tipMm: null });
  });

  it('a vent wider than the formed sheet is told to be narrower, and then passes', () => {
    const wide = reportOn(pit(1.2), exact);
    const check = checkOf(wide, 'vents');
    expect(check).toMatchObject({ status: 'caution', unit: 'mm' });
    expect(check.limit).toBeCloseTo(0.8 / wide.plan.arealDrawRatio, 6);
    const drawn = Number(/with ([\d.]+) mm/.exec(check.remedy)?.[1]);
    expect(checkOf(reportOn(pit(drawn), exact), 'vents').status).toBe('pass');
  });

  it('a vent that prints shut is told the diameter to draw, and then is open', () => {
    const check = checkOf(reportOn(pit(0.5), coarse), 'vents');
    expect(check).toMatchObject({ status: 'caution', limit: 0.4 });
    expect(check.measured).toBeCloseTo(0.3, 2);
    const drawn = Number(/with ([\d.]+) mm/.exec(check.remedy)?.[1]);
    expect(drawn).toBe(0.6);
    expect(reportOn(pit(drawn), coarse).vents[0].printable).toBe(true);
  });
});
