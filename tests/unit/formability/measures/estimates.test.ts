import { describe, expect, it } from 'vitest';
import { fillRecipe } from '@/lib/formability/fill-recipe';
import { FILAMENTS } from '@/lib/formability/materials/filaments';
import { drivingPressures, estimateAir } from '@/lib/formability/measures/estimate-air';
import { estimateHeat, softeningLimitC } from '@/lib/formability/measures/estimate-heat';
import { estimateHold } from '@/lib/formability/measures/estimate-hold';
import { estimatePrint } from '@/lib/formability/measures/estimate-print';
import { estimateSkin } from '@/lib/formability/measures/estimate-skin';
import { markIn } from '@/lib/formability/measures/estimate-vent-marks';
import { evacuationS } from '@/lib/formability/physics/gas-flow';
import type { RecipeInput } from '@/lib/formability/recipe';

/** Estimates worked by hand, on recipes alone. Assumed values (common practice, no source) stand in the sums as figures. */

const cold = { peakC: [23], contactC: 23 };
/** E h³ / 12 (1 − ν²) of PA-CF at 23 °C with creep factor 3 and ν = 0.35, N mm. */
const rigid = (mm: number) => ((6500 / 3) * mm ** 3) / (12 * (1 - 0.35 ** 2));

describe('skin', () => {
  const skin = (print: RecipeInput['print'], recipe: RecipeInput = {}) =>
    estimateSkin(fillRecipe({ ...recipe, print: { topMm: 1, infillPercent: 20, ...print } }), cold);

  it('over lines: q s⁴ / 384 D and q s² / 2 h², s = 0.45 / 0.2 − 0.45 mm, q = 0.4 MPa', () => {
    const found = skin({ infillPattern: 'lines' });
    expect(found.spanMm).toBeCloseTo(1.8, 12);
    expect(found.sagMm! / ((0.4 * 1.8 ** 4) / (384 * rigid(1)))).toBeCloseTo(1, 9);
    expect(found.stressMPa).toBeCloseTo((0.4 * 1.8 ** 2) / 2, 9);
  });

  it('over triangles that let the edges turn: 1.5 spans high, q a⁴ / 972 D', () => {
    const found = skin({ infillPattern: 'triangles' });
    expect(found.spanMm).toBeCloseTo((2 * 0.45) / 0.2, 12);
    expect(found.sagMostMm! / ((0.4 * 6.75 ** 4) / (972 * rigid(1)))).toBeCloseTo(1, 9);
  });

  it('0.05 mm show through a sheet thinner than 1.5 mm, 0.1 mm through a thicker one', () => {
    const limit = (gaugeMm: number) => skin({}, { sheet: { gaugeMm } }).limitMm;
    expect([limit(1.4925), limit(1.5075)]).toEqual([0.05, 0.1]);
  });

  it.each([
    ['sag', 4, 150, 0.5],
    ['stress', 30, 170, 0.3],
  ])(
    'the top and the infill that it asks for hold just so where %s rules',
    (what, infillPercent, celsius, topMm) => {
      const hot = { peakC: [celsius], contactC: celsius };
      const at = (print: object) =>
        estimateSkin(fillRecipe({ print: { infillPattern: 'lines', infillPercent, topMm, ...print } }), hot);
      const first = at({});
      const share = (found: typeof first) =>
        what === 'sag' ? found.sagMm! / found.limitMm : found.stressMPa! / found.strengthMPa;
      const other = (found: typeof first) =>
        what === 'sag' ? found.stressMPa! / found.strengthMPa : found.sagMm! / found.limitMm;
      const [thicker, denser] = [at({ topMm: first.topThatHoldsMm }), at({ infillPercent: first.infillThatHoldsPercent })]; // prettier-ignore
      for (const mended of [thicker, denser]) {
        expect(share(mended)).toBeCloseTo(1, 9);
        expect(other(mended)).toBeLessThan(1);
      }
    },
  );
});

describe('walls', () => {
  const walls = (print: object, recipe: RecipeInput = {}, hollow = false) =>
    estimateHold(
      fillRecipe({ ...recipe, print: { infillPercent: 20, infillPattern: 'lines', shellMm: 2, ...print } }),
      cold,
      { hollow, minMm: hollow ? 2 : null } as never,
      [120, 90, 40],
    );

  it('filled: a strip between lines, and the load on the infill’s own walls, p / ρ', () => {
    const found = walls({});
    expect(found.sagMm / ((0.4 * 1.8 ** 4) / (384 * rigid(2)))).toBeCloseTo(1, 9);
    expect(found.infill?.stressMPa).toBeCloseTo(0.4 / 0.2, 12);
    // 0.4 of 4 π² E / 12 (1 − ν²) (w / s)².
    const ideal = ((4 * Math.PI ** 2 * (6500 / 3)) / (12 * (1 - 0.35 ** 2))) * (0.45 / 1.8) ** 2;
    expect(found.infill?.bucklesMPa).toBeCloseTo(0.4 * ideal, 6);
  });

  it('empty: a ring of half the longer side collapses at 0.4 of E t³ / 4 (1 − ν²) R³', () => {
    const ideal = ((6500 / 3) * 2 ** 3) / (4 * (1 - 0.35 ** 2) * 60 ** 3);
    expect(walls({}, {}, true).collapseBar).toBeCloseTo((0.4 * ideal) / 0.1, 9);
  });

  it.each([
    ['give 0.1 mm', { shellMm: 0.3, infillPercent: 5, infillPattern: 'grid' }],
    ['stand on ribs that just do not buckle', { shellMm: 4, infillPercent: 1, infillPattern: 'grid' }],
  ])('at the infill that it asks for they %s', (what, print) => {
    const { infillThatHoldsPercent } = walls(print);
    const mended = walls({ ...print, infillPercent: infillThatHoldsPercent });
    const [sag, load] = [mended.sagMm / 0.1, mended.infill!.stressMPa / mended.infill!.bucklesMPa];
    expect(what.startsWith('give') ? sag : load).toBeCloseTo(1, 6);
    expect(Math.max(sag, load)).toBeLessThan(1 + 1e-6);
  });

  it('asks for no more than 100 % of infill', () => {
    const asked = (pressureBar: number) => walls({ shellMm: 0.1, infillPattern: 'grid', lineMm: 1 }, { machine: { pressureBar } }).infillThatHoldsPercent; // prettier-ignore
    const one = asked(4)!;
    // Sag of a cell goes with pressure and span⁴, span against density: density with the fourth root of pressure.
    const bar = (percent: number) => 4 * (percent / one) ** 4;
    expect(asked(bar(99.6))).toBeCloseTo(99.6, 6);
    expect(asked(bar(100.4))).toBeNull();
  });
});

describe('heat', () => {
  it('10 K are kept from the softening of amorphous polymers, none from that of crystalline ones', () => {
    expect(softeningLimitC(FILAMENTS.petg)).toBe(60);
    expect(softeningLimitC(FILAMENTS['pa12-cf'])).toBe(145);
  });

  it('a print is solid from 100 % of infill on', () => {
    const model = (infillPercent: number) => estimateHeat(fillRecipe({ print: { infillPercent } })).model;
    expect([model(99.5), model(100)]).toEqual(['lumped', '1-d']);
  });

  it('no cycle is longer than an hour', () => {
    // Half-space of PC: e = √(0.205 · 1200 · 1200) = 543.32; Q″ = 1270 · 1750 · 0.8e-3 · 71 = 126,238 J/m².
    const first = 126_238 / (Math.sqrt(0.205 * 1200 * 1200) * Math.sqrt(Math.PI * 3600));
    let sum = 0;
    let pulls = 0;
    while (first * (sum + 1 / Math.sqrt(pulls + 1)) <= 128.5 - 10 - 23) sum += 1 / Math.sqrt(++pulls);
    const cycle = (planned: number) =>
      estimateHeat(fillRecipe({ print: { material: 'pc', infillPercent: 100 }, run: { pulls: planned } })).cycleThatHoldsS; // prettier-ignore
    expect(cycle(pulls)).toBeGreaterThan(3585);
    expect(cycle(pulls + 1)).toBeNull();
  });

  it('the lump: Q″ / ρ c b a pull, and 15 W/m²K of loss', () => {
    const { peakC } = estimateHeat(fillRecipe({ print: { material: 'pc' }, run: { pulls: 5, cycleS: 60 } }));
    const capacity = 1200 * 1200 * 0.004;
    const kept = Math.exp((-60 * 15) / capacity);
    expect(peakC[4]).toBeCloseTo(23 + ((126_238 / capacity) * (1 - kept ** 5)) / (1 - kept), 6);
  });
});

describe('print: 60 mm/s at 70 %, 2 s a layer, filament of 1.75 mm', () => {
  it('in seconds, grams, metres and money', () => {
    const block = {
      volumeMm3: 240_000,
      heightMm: 30,
      wallAreaMm2: 10_800,
      topAreaMm2: 8000,
      bottomAreaMm2: 8000,
    };
    const recipe = fillRecipe({ print: { infillPercent: 100, layerMm: 0.2, lineMm: 0.45, material: 'pla' } });
    const found = estimatePrint(block, recipe);
    expect(found.materialMm3).toBeCloseTo(240_000, 9);
    expect(found.timeS).toBeCloseTo(240_000 / (0.45 * 0.2 * 60 * 0.7) + 150 * 2, 6);
    expect(found.massG).toBeCloseTo(240 * 1.24, 9);
    expect(found.filamentM).toBeCloseTo(240 / ((Math.PI / 4) * 1.75 ** 2), 9);
    expect(found.cost).toBeCloseTo(0.2976 * 25 + (found.timeS / 3600) * 1.5 + 7.5, 9);
    const half = estimatePrint(block, { ...recipe, print: { ...recipe.print, infillPercent: 50 } });
    const inner = 240_000 * (1 - (10_800 * 4) / 480_000) ** 2 * (1 - (16_000 * 4) / 240_000);
    expect(half.materialMm3).toBeCloseTo(240_000 - inner / 2, 6);
  });
});

describe('air', () => {
  it('is driven by 1 bar over the air below, or the machine’s pressure where that is less, at the air’s temperature', () => {
    const pressures = (pressureBar: number) => drivingPressures(fillRecipe({ machine: { pressureBar } }));
    expect(pressures(4)).toEqual({ upstreamPa: 201_325, downstreamPa: 101_325, kelvin: 296.15 });
    expect(pressures(0.5).upstreamPa).toBe(151_325);
  });

  /** A pit 40 × 40 mm in a grid of 1 mm, its floor at 10 of 30 mm. */
  const nx = 60;
  const surface = Float64Array.from({ length: nx * nx }, (_, c) => {
    const [i, j] = [c % nx, Math.floor(c / nx)];
    return i >= 10 && i < 50 && j >= 10 && j < 50 ? 10 : 30;
  });
  const grid = { nx, ny: nx, cell: 1, x0: 0, y0: 0 };
  const flow = (print: object, vents: object[] = []) => {
    const trap = { floor: [30, 30, 10], spillZMm: 30, volumeMm3: 32_000, planAreaMm2: 1600, trapsAir: true, parent: null, vents: vents.map((_, v) => v) }; // prettier-ignore
    const part = { traps: [trap], vents, surface, grid } as never;
    return estimateAir(fillRecipe({ print: { holeModel: print } }), part, 0.5)[0];
  };
  const vent = { at: [30, 30, 10], diameterMm: 1, printedMm: 1, lengthMm: 10, printable: true };

  it('leaves by a sharp hole of discharge 0.6: V / (C_d A C* √(R T))', () => {
    const found = flow({}, [vent]);
    const speed = 0.6847315 * Math.sqrt(287.05 * 296.15);
    expect(found.clearS! / (32_000e-9 / (0.6 * (Math.PI / 4) * 1e-6 * speed))).toBeCloseTo(1, 6);
  });

  it('falls to a tenth of its pressure once the sheet has set', () => {
    const room = { fromPa: 201_325, toPa: 111_325, againstPa: 101_325, kelvin: 296.15 };
    expect(flow({}, [vent]).fallS).toBeCloseTo(evacuationS(32_000, Math.PI / 4, 0.6, room), 9);
  });

  it('no vent is narrower than 0.1 mm, and no more than 24 places are listed', () => {
    const found = flow({ minOpenMm: 0.05 });
    expect(found.ventDiameterMm).toBe(0.1);
    expect(found.ventsNeeded).toBeGreaterThan(60);
    expect(found.ventPlaces).toHaveLength(24);
  });
});

describe('vent marks: a sheet of 3 MPa and ν = 0.5 at forming temperature', () => {
  it('thick: q a⁴ / 64 D and the shear q a² / 4 κ G t', () => {
    const bending = (0.4 * 0.4 ** 4) / (64 * ((3 * 0.6 ** 3) / (12 * (1 - 0.25))));
    const shear = (0.4 * 0.4 ** 2) / (4 * (5 / 6) * 1 * 0.6);
    expect(markIn(0.4, 0.4, 0.6).heightMm).toBeCloseTo(bending + shear, 9);
  });
  it('thin: a membrane, 0.26561 mm (A10)', () => {
    expect(Math.abs(markIn(0.4, 0.5, 0.2).heightMm / 0.26561 - 1)).toBeLessThan(2e-4);
  });
});
