import { describe, expect, it } from 'vitest';
import { FILAMENT_IDS, FILAMENTS } from '@/lib/formability/materials/filaments';
import type { RecipeInput } from '@/lib/formability/recipe';
import { openFrustum } from '../../../fixtures/meshes/hollow';
import { frustum } from '../../../fixtures/meshes/solids';
import { checkOf, reportOn } from '../run-engine';

/** Heat, skin and walls at the modulus of the hottest pull. Materials are generic, figures from memory. */

const coarse = { grid: { cellMm: 1 } };
const solid = frustum(120, 90, 40, 8);
const of = (recipe: RecipeInput, mesh = solid) => reportOn(mesh, { ...coarse, ...recipe });

describe('heat', () => {
  it('contact and build-up by hand: PETG of 0.8 mm at 144.5 °C on a 4 mm shell of PC', () => {
    const { heat } = of({ print: { material: 'pc' }, run: { pulls: 5, cycleS: 60 } });
    // e = √(kρc): sheet 666.71, tool √(0.205 · 1200 · 1200) = 543.32 W√s/m²K.
    expect(heat?.contactC).toBeCloseTo((666.708 * 144.5 + 543.323 * 23) / (666.708 + 543.323), 2);
    // Q″ = 1270 · 1750 · 0.8e-3 · (144.5 − 73.5) = 126,238 J/m²; ΔT₁ = Q″ / (1200 · 1200 · 0.004) = 21.916 K; τ = 384 s.
    const kept = Math.exp(-60 / 384);
    expect(heat?.peakC).toHaveLength(5);
    expect(heat?.peakC[4]).toBeCloseTo(23 + (21.916 * (1 - kept ** 5)) / (1 - kept), 1);
    expect(heat?.peakC[0]).toBe(heat?.contactC);
    expect(heat?.limitC).toBeCloseTo(128.5 - 10, 9);
    expect(heat?.model).toBe('lumped');
  });

  it('never says hotter than the sheet, and calls a solid print a half-space', () => {
    const { heat } = of({ print: { material: 'pc', infillPercent: 100 }, run: { pulls: 400, cycleS: 20 } });
    expect(heat?.model).toBe('1-d');
    expect(Math.max(...(heat?.peakC ?? []))).toBe(144.5);
  });

  it('too many pulls ask for a longer cycle or a rest, and either mends it', () => {
    const recipe = { print: { material: 'pc' }, run: { pulls: 60, cycleS: 40 } };
    const report = of(recipe);
    const check = checkOf(report, 'heat');
    expect(check.status).toBe('fail');
    const { cycleThatHoldsS, pullsBeforeRest } = report.heat ?? {};
    expect(check.remedy).toContain(`ake ${cycleThatHoldsS} s a pull`);
    expect(check.remedy).toContain(`after every ${pullsBeforeRest} pulls`);
    const held = (run: object) => checkOf(of({ ...recipe, run: { ...recipe.run, ...run } }), 'heat').status;
    expect(held({ cycleS: cycleThatHoldsS })).not.toBe('fail');
    expect(held({ cycleS: (cycleThatHoldsS ?? 0) - 2 })).toBe('fail');
    expect(held({ pulls: pullsBeforeRest })).not.toBe('fail');
    expect(held({ pulls: (pullsBeforeRest ?? 0) + 1 })).toBe('fail');
  });

  it('a material that softens at the first touch is told to be another, and that one holds', () => {
    const report = of({ print: { material: 'pla' } });
    const check = checkOf(report, 'heat');
    expect(check).toMatchObject({ status: 'fail', unit: '°C' });
    expect(report.heat?.pullsBeforeRest).toBe(0);
    expect(report.heat?.cycleThatHoldsS).toBeNull();
    const named = FILAMENT_IDS.find((id) => check.remedy.includes(`rint it in ${FILAMENTS[id].name}`));
    expect(named).toBeDefined();
    expect(checkOf(of({ print: { material: named } }), 'heat').status).toBe('pass');
  });
});

describe('skin', () => {
  const weak = {
    print: { material: 'petg', topMm: 1, infillPercent: 15 },
    run: { pulls: 1 },
    sheet: { formingC: 125 },
  };

  it('a clamped square over grid infill, by hand', () => {
    const { skin } = of({ print: { topMm: 0.9, infillPercent: 20 } });
    expect(skin?.spanMm).toBeCloseTo((2 * 0.45) / 0.2, 9);
    // 0.00126532 q s⁴ / D, D = E/3 · h³ / 12 (1 − 0.35²).
    const rigid = ((skin?.modulusMPa ?? 0) / 3) * (0.9 ** 3 / (12 * (1 - 0.35 ** 2)));
    expect(skin?.sagMm).toBeCloseTo((0.00126532 * 0.4 * 4.5 ** 4) / rigid, 5);
    expect(skin?.limitMm).toBe(0.05);
    expect(of({ sheet: { gaugeMm: 1.5 } }).skin?.limitMm).toBe(0.1);
  });

  it.each(['lines', 'grid', 'triangles', 'gyroid'] as const)(
    'over %s asks for a thicker top or more infill, and either mends it',
    (infillPattern) => {
      const recipe = { ...weak, print: { ...weak.print, infillPattern, infillPercent: 8 } };
      const check = checkOf(of(recipe), 'skin');
      expect(check.status).not.toBe('pass');
      const top = Number(/a top of ([\d.]+) mm/.exec(check.remedy)?.[1]);
      const infill = Number(/infill of (\d+) %/.exec(check.remedy)?.[1]);
      const again = (print: object) =>
        checkOf(of({ ...recipe, print: { ...recipe.print, ...print } }), 'skin');
      expect(again({ topMm: top }).status).toBe('pass');
      expect(again({ topMm: top - 0.15 }).status).not.toBe('pass');
      expect(again({ infillPercent: infill }).status).toBe('pass');
      expect(again({ infillPercent: infill - 2 }).status).not.toBe('pass');
    },
  );

  it('doubled pressure with doubled modulus changes nothing; doubled pressure doubles the sag', () => {
    const one = of({ machine: { pressureBar: 2 } }).skin?.sagMm ?? 0;
    expect((of({ machine: { pressureBar: 4 } }).skin?.sagMm ?? 0) / one).toBeCloseTo(2, 9);
  });

  it('without infill nothing carries the top, and the report stays JSON', () => {
    const report = of({ print: { infillPercent: 0 } });
    expect(report.skin).toMatchObject({ spanMm: null, sagMm: null });
    const { status, remedy } = checkOf(report, 'skin');
    expect(status).toBe('fail');
    const infillPercent = Number(/infill of (\d+) %/i.exec(remedy)?.[1]);
    expect(infillPercent).toBeGreaterThan(0);
    expect(checkOf(of({ print: { infillPercent } }), 'skin').status).toBe('pass');
    expect(JSON.parse(JSON.stringify(report)).skin).toEqual(report.skin);
  });
});

describe('the top of a hollow template', () => {
  it('has no infill below: it is asked for a look as a plate over the whole plan, and what it asks for holds', () => {
    const of2 = (topMm: number) => checkOf(of({}, openFrustum(60, 50, 20, 8, 2, topMm)), 'skin');
    const thin = of2(2);
    expect(thin.status).toBe('caution');
    expect(thin.message).toContain('no infill carries its 2 mm top');
    const wanted = Number(/top ([\d.]+) mm thick/.exec(thin.remedy)?.[1]);
    expect(wanted).toBeGreaterThan(2);
    expect(of2(wanted + 0.05).status).toBe('pass');
    expect(of2(wanted - 0.2).status).toBe('caution');
  });

  it('of a solid print has no free span', () => {
    expect(checkOf(of({ print: { infillPercent: 100 } }), 'skin').message).toContain('has no free span');
  });
});

describe('walls', () => {
  it('filled walls cannot buckle as a ring; an empty shell can, and says at which pressure', () => {
    expect(of({}).wallsUnderPressure).toMatchObject({ empty: false, collapseBar: null, wallMm: 4 });
    const report = of({}, openFrustum(120, 90, 40, 8, 1.2, 1.6));
    const hold = report.wallsUnderPressure;
    expect(hold?.empty).toBe(true);
    expect(hold?.wallMm).toBeCloseTo(1.2, 1);
    const modulus = (report.skin?.modulusMPa ?? 0) / 3;
    const ring = (modulus * (hold?.wallMm ?? 0) ** 3) / (4 * (1 - 0.35 ** 2) * 60 ** 3);
    expect(hold?.collapseBar).toBeCloseTo((0.4 * ring) / 0.1, 6);
    const check = checkOf(report, 'walls');
    expect(check).toMatchObject({ status: 'fail', unit: 'bar', limit: 4 });
    expect(check.remedy).toMatch(
      /^Make the walls [\d.]+ mm thick, or rib or fill it: ribs no more than [\d.]+ mm apart/,
    );
    // Between ribs a clamped strip, q s⁴ / 384 D, gives the 0.1 mm that it may, or bends to its strength, q s² / 2 h².
    const [s, h] = [hold?.ribSpacingMm ?? 0, hold?.wallMm ?? 0];
    const sag = (0.4 * s ** 4) / (384 * ((modulus * h ** 3) / (12 * (1 - 0.35 ** 2))));
    const share = (0.4 * s * s) / (2 * h * h) / (hold?.strengthMPa ?? 1);
    expect(Math.max(sag / 0.1, share)).toBeCloseTo(1, 9);
  });

  it('the wall that it asks for holds', () => {
    const check = checkOf(of({}, openFrustum(160, 120, 60, 8, 2, 2)), 'walls');
    const wall = Number(/walls ([\d.]+) mm/.exec(check.remedy)?.[1]);
    expect(wall).toBeGreaterThan(2);
    expect(checkOf(of({}, openFrustum(160, 120, 60, 8, wall, wall)), 'walls').status).not.toBe('fail');
  });
});

it('geometry alone leaves physics out and says so', async () => {
  const { analyse } = await import('@/lib/formability/analyse');
  const { binaryStl } = await import('../../../fixtures/meshes/write-stl');
  const { report } = analyse(binaryStl(solid), coarse, { geometryOnly: true });
  expect(report).toMatchObject({ heat: null, skin: null, wallsUnderPressure: null });
  for (const id of ['heat', 'skin', 'walls'] as const) {
    expect(checkOf(report, id)).toMatchObject({ status: 'not-run' });
    expect(checkOf(report, id).message).toContain('only geometry was asked for');
  }
});
