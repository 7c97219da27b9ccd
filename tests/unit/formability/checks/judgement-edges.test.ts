import { describe, expect, it } from 'vitest';
import { checkAir } from '@/lib/formability/checks/check-air';
import { checkDraft } from '@/lib/formability/checks/check-draft';
import { checkDraw } from '@/lib/formability/checks/check-draw';
import { checkEdges } from '@/lib/formability/checks/check-edges';
import { checkFit } from '@/lib/formability/checks/check-fit';
import { checkHeat } from '@/lib/formability/checks/check-heat';
import type { CheckInput } from '@/lib/formability/checks/check-input';
import { checkLayers } from '@/lib/formability/checks/check-layers';
import { checkNozzle } from '@/lib/formability/checks/check-nozzle';
import { checkRelease } from '@/lib/formability/checks/check-release';
import { checkSheet } from '@/lib/formability/checks/check-sheet';
import { checkShell } from '@/lib/formability/checks/check-shell';
import { checkSkin } from '@/lib/formability/checks/check-skin';
import { checkSpacing } from '@/lib/formability/checks/check-spacing';
import { checkUndercut } from '@/lib/formability/checks/check-undercut';
import { checkVents } from '@/lib/formability/checks/check-vents';
import { checkWalls } from '@/lib/formability/checks/check-walls';
import { checkWith } from './check-with';
import { at, many } from './made-places';

/** What a check adds to the limits of the recipe: each stands between just inside and just beyond. */
describe('draft', () => {
  const draft = (facetDeg: number, change: (input: CheckInput) => void = () => {}) =>
    checkWith(checkDraft, (input) => {
      input.recipe.print.sanded = true;
      Object.assign(input.walls, { facetDeg, areaBelowMm2: 50, heightMm: 100 });
      change(input);
    });

  it('a wall drawn with 3° and rounded by less than 0.01° does not fail', () => {
    expect([draft(2.99005).status, draft(2.98995).status]).toEqual(['caution', 'fail']);
  });

  it('asks for tenths of a degree, and says what they take at the foot: 100 mm (tan 5° − tan 3.93°) = 1.88 mm', () => {
    expect(draft(3.93).remedy).toContain('Add 1.1° to these walls');
    expect(draft(-4).remedy).toContain('Add 9° to these walls');
    expect(draft(3.93).remedy).toContain('that is 1.9 mm more at the foot');
    // 1000 mm (tan 5° − tan 3.93°) = 18.79 mm: a turn of 181.8° would say 18.6.
    const tall = draft(3.93, ({ walls }) => (walls.heightMm = 1000));
    expect(tall.remedy).toContain('that is 18.8 mm more at the foot');
  });

  it('shows the first twelve places', () => {
    const regions = (count: number) => many(count, (k) => ({ at: at(k), areaMm2: 4, minDeg: 1 }));
    const shown = (count: number) =>
      draft(4, ({ report }) => (report.draft.regions = regions(count))).places.length;
    expect([shown(12), shown(15)]).toEqual([12, 12]);
  });
});

describe('draw', () => {
  it('asks for heights in tenths of a millimetre and gauges in steps of 0.05 mm', () => {
    const high = checkWith(checkDraw, ({ recipe, report, sizeMm }) => {
      recipe.sheet.gaugeMm = 5;
      sizeMm[2] = 100;
      Object.assign(report.plan, { depthRatio: 1.25 });
    });
    expect(high.remedy).toMatch(/^Lower the template to 80 mm/);
    const odd = checkWith(checkDraw, ({ recipe, report, sizeMm }) => {
      recipe.sheet.gaugeMm = 5;
      sizeMm[2] = 100.124;
      Object.assign(report.plan, { depthRatio: 1.25 });
    });
    // 80.099 mm: down to the tenth; steps of 0.101 mm would say 80.1.
    expect(odd.remedy).toMatch(/^Lower the template to 80 mm/);
    const thin = checkWith(checkDraw, ({ recipe, report }) => {
      Object.assign(recipe.sheet, { gaugeMm: 0.8, minFormedMm: 0.7 });
      Object.assign(report.plan, { arealDrawRatio: 2.2, linearDrawRatioX: 1, linearDrawRatioY: 1, depthRatio: 0.4 }); // prettier-ignore
    });
    // 0.7 × 2.2 = 1.54 mm: up to the next 0.05; steps of 0.0505 mm would say 1.57.
    expect(thin.remedy).toContain('take a gauge of 1.55 mm');
  });
});

describe('edges, fit, layers', () => {
  it('names a radius of 1.5 gauges as the better one', () => {
    const check = checkWith(checkEdges, ({ report }) => (report.edges.minConvexRadiusMm = 0.1));
    expect(check.remedy).toContain('1.5 gauges (1.2 mm)');
  });

  it('shrinks to whole tenths of a per cent', () => {
    const check = checkWith(checkFit, (input) => (input.sizeMm = [100, 80, 123.597]));
    // 120 / 123.597 = 97.09 %; steps of 0.101 % would say 97.1.
    expect(check.remedy).toMatch(/^Shrink it to 97 %/);
    const half = checkWith(checkFit, (input) => (input.sizeMm = [100, 80, 240]));
    expect(half.remedy).toMatch(/^Shrink it to 50 %/);
  });

  it('asks for layers in whole hundredths of a millimetre', () => {
    const check = checkWith(checkLayers, ({ report }) => (report.layers.cuspMaxMm = 0.102));
    // 0.15 × 0.1 / 0.102 = 0.147 mm.
    expect(check.remedy).toMatch(/^Print in layers of 0.14 mm/);
    const finer = checkWith(checkLayers, ({ report }) => (report.layers.cuspMaxMm = 0.1071));
    // 0.14006 mm; steps of 0.0101 mm would say 0.13.
    expect(finer.remedy).toMatch(/^Print in layers of 0.14 mm/);
  });
});

describe('nozzle: 0.4 mm as the standard (common practice, no source)', () => {
  const nozzle = (sideMm: number, nozzleMm: number, detail: object = {}) =>
    checkWith(checkNozzle, (input) => {
      input.sizeMm = [sideMm, 20, 20];
      Object.assign(input.recipe.print, { nozzleMm, lineMm: 1.125 * nozzleMm });
      Object.assign(input.report.detail, {
        smallestFeatureMm: null,
        smallestFeatureAt: null,
        smallestGapMm: null,
        ...detail,
      });
    });

  it.each([
    [50, 0.4],
    [100, 0.5],
    [200, 0.6],
  ])('over %s mm of length no wider than %s mm, rounding of 0.001 mm aside', (sideMm, most) => {
    const status = (off: number) => nozzle(sideMm, most + off).status;
    expect([status(0.000995), status(0.001005)]).toEqual(['pass', 'caution']);
  });

  it('over a large template no finer than 0.3 mm', () => {
    expect([nozzle(200, 0.2985).status, nozzle(200, 0.3015).status]).toEqual(['caution', 'pass']);
    expect(nozzle(200, 0.25).remedy).toBe('Use a 0.4 mm nozzle.');
    expect(nozzle(200, 0.8).remedy).toBe('Use a 0.6 mm nozzle.');
  });

  it.each([0.2, 0.25, 0.3, 0.4, 0.5])(
    '%s mm is sold: two lines to the thinnest solid, one to a gap',
    (size) => {
      const fits = (detail: object) => nozzle(100, 0.8, detail).remedy;
      const words = `Use a ${size} mm nozzle, or widen the`;
      expect(fits({ smallestFeatureMm: 2 * 1.125 * (size - 0.0005) })).toContain(words);
      expect(fits({ smallestGapMm: 1.125 * (size - 0.0005) })).toContain(words);
    },
  );

  it('where the finest is too wide, the detail has to grow: 2 × 1.125 × 0.2 = 0.45 mm', () => {
    const { remedy } = nozzle(100, 0.4, { smallestFeatureMm: 2 * 1.125 * 0.1985 });
    expect(remedy).toBe('No nozzle is fine enough: widen the detail to 0.45 mm and use a 0.2 mm nozzle, or to 0.9 mm with this one.'); // prettier-ignore
  });
});

describe('spacing', () => {
  const gap = (heightMm: number, gapMm: number, gapAtBedMm: number) =>
    checkWith(checkSpacing, ({ report }) => {
      report.spacing = [
        { gapMm, gapAtBedMm, heightMm, heightOverGap: heightMm / gapAtBedMm, between: [at(0), at(1)] },
      ];
    });

  it('a web is certain from 1.75 times the limit on (common practice, no source)', () => {
    expect([gap(17.4, 10, 10).status, gap(17.6, 10, 10).status]).toEqual(['caution', 'fail']);
  });

  it('sides that close to less than a tenth meet in a groove, which is judged by its opening', () => {
    expect(gap(30, 20, 1.99).measured).toBeCloseTo(30 / 20, 9);
    expect(gap(30, 20, 2.01).measured).toBeCloseTo(30 / 2.01, 9);
  });

  it('widens to whole halves of a millimetre and shows the first twelve', () => {
    // 60.4 mm: up to 60.5; steps of 0.505 mm would say 60.6.
    expect(gap(60.4, 10, 10).remedy).toMatch(/^Widen the gap to 60.5 mm/);
    const crowd = checkWith(checkSpacing, ({ report }) => {
      report.spacing = many(15, (k) => ({ gapMm: 5, gapAtBedMm: 5, heightMm: 9, heightOverGap: 1.8, between: [at(k), at(k)] })); // prettier-ignore
    });
    expect(crowd.places).toHaveLength(12);
  });
});

describe('undercut and release', () => {
  const locking = (count: number, volumeMm3: number) =>
    checkWith(checkUndercut, ({ report }) => {
      const region = (k: number) => ({ at: at(k), zMm: [0, 50], maxDepthMm: 50, planAreaMm2: 4, volumeMm3 });
      report.undercut = { ...report.undercut, maxDepthMm: 50, regions: many(count, region) as never };
    });

  it('says what to fill in cm³ and how far to lean: atan(50 / 50) = 45°', () => {
    expect(locking(1, 12_340).remedy).toContain('(12.34 cm³ in all)');
    expect(locking(1, 12_340).remedy).toContain('lean its wall back by 45°');
    expect(locking(15, 1).places).toHaveLength(12);
  });

  it('a depth of more than half the frame, and overhangs deeper than 0.01 mm, speak for a release agent', () => {
    const release = (depthRatio: number, maxDepthMm: number) =>
      checkWith(checkRelease, ({ recipe, report }) => {
        Object.assign(recipe.print, { sanded: true, releaseAgent: 'none' });
        report.plan.depthRatio = depthRatio;
        report.undercut.maxDepthMm = maxDepthMm;
      }).status;
    expect([release(0.498, 0), release(0.502, 0)]).toEqual(['pass', 'caution']);
    expect([release(0.4, 0.00995), release(0.4, 0.01005)]).toEqual(['pass', 'caution']);
  });
});

describe('heat, skin and walls', () => {
  it('heat is near its limit within 10 K (common practice, no source)', () => {
    const peak = (celsius: number) =>
      checkWith(checkHeat, ({ report }) => Object.assign(report.heat!, { contactC: celsius, peakC: [celsius], limitC: 100, transient: { ...report.heat!.transient, peakC: celsius } })); // prettier-ignore
    expect([peak(89.95).status, peak(90.05).status, peak(100.1).status]).toEqual(['pass', 'caution', 'fail']);
  });

  it('a sag of twice what shows is a failure, and a top of more than ten times as much is no remedy', () => {
    const skin = (sagMm: number, topThatHoldsMm = 5) =>
      checkWith(checkSkin, ({ report }) =>
        Object.assign(report.skin!, { sagMm, limitMm: 0.05, topThatHoldsMm, infillThatHoldsPercent: null }),
      );
    expect([skin(0.0498).status, skin(0.0502).status]).toEqual(['pass', 'caution']);
    expect([skin(0.0995).status, skin(0.1005).status]).toEqual(['caution', 'fail']);
    // 4 mm of top now; 12.34 mm: up to a tenth, where steps of 0.101 mm would say 12.4 as well, 20.31 would not.
    expect(skin(1, 12.34).remedy).toBe('Print a top of 12.4 mm.');
    expect(skin(1, 20.31).remedy).toBe('Print a top of 20.4 mm.');
    expect(skin(1, 39.9).remedy).toBe('Print a top of 39.9 mm.');
    expect(skin(1, 40.1).remedy).toContain('too soft');
  });

  it('100 % of infill is the most that is asked for', () => {
    const infill = (infillThatHoldsPercent: number) =>
      checkWith(checkSkin, ({ report }) =>
        Object.assign(report.skin!, {
          sagMm: 1,
          limitMm: 0.05,
          topThatHoldsMm: null,
          infillThatHoldsPercent,
        }),
      ).remedy;
    expect(infill(99.9)).toBe('Print an infill of 100 %.');
    expect(infill(100.5)).toContain('too soft');
  });

  it('walls give from 0.1 mm on and fail from twice that (common practice, no source)', () => {
    const walls = (hold: object) =>
      checkWith(checkWalls, ({ report }) =>
        Object.assign(report.wallsUnderPressure!, { empty: false, collapseBar: null, infill: null, stressMPa: 1, strengthMPa: 10, sagMm: 0, wallMm: 2, ...hold })); // prettier-ignore
    expect([walls({ sagMm: 0.0995 }).status, walls({ sagMm: 0.1005 }).status]).toEqual(['pass', 'caution']);
    expect([walls({ sagMm: 0.199 }).status, walls({ sagMm: 0.201 }).status]).toEqual(['caution', 'fail']);
    const hollow = (collapseBar: number) => walls({ empty: true, collapseBar });
    expect([hollow(3.99).status, hollow(4.01).status]).toEqual(['fail', 'caution']);
    expect([hollow(5.97).status, hollow(6.03).status]).toEqual(['caution', 'pass']);
    // Sag goes with the third power: 2 mm (0.8 / 0.1)^⅓ = 4 mm. Collapse: 2 mm (6 / 0.75)^⅓ = 4 mm.
    expect(walls({ sagMm: 0.8 }).remedy).toContain('Make the walls 4 mm thick');
    expect(hollow(0.75).remedy).toContain('Make the walls 4 mm thick');
    // Ten times as thick is another template: (98.5 / 0.1)^⅓ = 9.95, (101.5 / 0.1)^⅓ = 10.05.
    expect(walls({ sagMm: 98.5 }).remedy).toContain('Make the walls');
    expect(walls({ sagMm: 101.5 }).remedy).toContain('too soft');
    // Ribs in whole tenths of a millimetre, down; steps of 0.101 mm would say 80.1.
    expect(walls({ sagMm: 0.8, empty: true, ribSpacingMm: 80.099 }).remedy).toContain(
      'ribs no more than 80 mm',
    );
    // 19.5 mm (0.8 / 0.1)^⅓ = 39 mm: to the tenth; steps of 0.101 mm would say 39.1.
    expect(walls({ sagMm: 0.8, wallMm: 19.5 }).remedy).toContain('Make the walls 39 mm thick');
  });
});

describe('air and vents', () => {
  const pocket = (clearS: number | null, change: (input: CheckInput) => void = () => {}) =>
    checkWith(checkAir, (input) => {
      input.report.airTraps = [{ floor: [0, 0, 3], planAreaMm2: 9 } as never];
      const flow = { trap: 0, clearS, ventsNeeded: 6, ventDiameterMm: 0.4, ventPlaces: many(6, at) };
      input.report.air = [flow as never];
      change(input);
    });

  it('says the pressure in bar, the first four places, and times from 0.01 s on', () => {
    expect(pocket(0.1, ({ recipe }) => (recipe.machine.pressureBar = 0.9505)).message).toContain(
      'at 1 bar over',
    );
    expect(pocket(0.1, ({ recipe }) => (recipe.machine.pressureBar = 0.9495)).message).toContain(
      'at 0.9 bar over',
    );
    expect(pocket(null).remedy).toContain('x 3, y 0, z 1, and 2 more as listed');
    expect(pocket(0.00995).message).toContain('less than 0.01 s');
    expect(pocket(0.01005).message).toContain('in 0.01 s');
    const falls = (fallS: number) => pocket(0.1, ({ report }) => (report.air[0].fallS = fallS)).message;
    expect(falls(0.00995)).not.toContain('Should the sheet set first');
    expect(falls(0.01005)).toContain('falls to a tenth in 0.01 s');
  });

  const vent = (printedMm: number, k = 0) => ({ at: at(k), diameterMm: printedMm + 0.2, lengthMm: 4, printable: printedMm >= 0.4, printedMm }); // prettier-ignore

  it('draws vents in steps of 0.05 mm: (0.4 + 0.2) / 1 = 0.6 mm, (0.415 + 0.2) / 1 = 0.65 mm', () => {
    const shut = (minOpenMm: number) =>
      checkWith(checkVents, ({ recipe, report }) => {
        recipe.print.holeModel.minOpenMm = minOpenMm;
        report.vents = many(14, (k) => vent(0.3, k)) as never;
      });
    expect(shut(0.4).remedy).toContain('with 0.6 mm');
    expect(shut(0.415).remedy).toContain('with 0.65 mm');
    expect(shut(0.4).places).toHaveLength(12);
  });

  it('narrows a vent that marks to steps of 0.05 mm below the formed thickness', () => {
    const marking = (thicknessMm: number) =>
      checkWith(checkVents, ({ report }) => {
        report.vents = [vent(2)] as never;
        report.ventMarks = [{ vent: 0, heightMm: 0.2, thicknessMm, limitMm: thicknessMm } as never];
      }).remedy;
    // 0.52 + 0.2 = 0.72 mm, down to 0.7; steps of 0.0505 mm would say 0.71. 1.02 + 0.2 = 1.22 mm, down to 1.2.
    expect(marking(0.52)).toContain('with 0.7 mm');
    expect(marking(1.02)).toContain('with 1.2 mm');
  });

  it('tells the first four pockets where air is not reckoned', () => {
    const check = checkWith(checkVents, (input) => {
      input.geometryOnly = true;
      const trap = (k: number) => ({ floor: at(k), planAreaMm2: 4, trapsAir: true });
      input.report.airTraps = many(6, trap) as never;
    });
    expect(check.remedy).toContain('x 3, y 0, z 1.');
    expect(check.remedy).not.toContain('x 4');
  });
});

describe('shell', () => {
  const shell = (print: object, hollow = false) =>
    checkWith(checkShell, (input) => {
      input.sizeMm = [200, 90, 40];
      Object.assign(input.recipe.print, print);
      Object.assign(input.report.walls, { hollow, minMm: hollow ? 6 : null, topMm: hollow ? 6 : null });
    });

  it('of 3 mm may be rounded by 0.001 mm', () => {
    const status = (mm: number) => shell({ shellMm: mm, topMm: mm }).status;
    expect([status(2.999005), status(2.998995)]).toEqual(['pass', 'caution']);
  });

  it('is none where all is printed solid, and none too many where a hollow model is', () => {
    const thick = { shellMm: 6, topMm: 6 };
    const measured = (infillPercent: number) => shell({ ...thick, infillPercent }).measured;
    expect([measured(99.5), measured(100)]).toEqual([6, null]);
    const status = (infillPercent: number) => shell({ ...thick, infillPercent }, true).status;
    expect([status(99.5), status(100)]).toEqual(['caution', 'pass']);
  });
});

describe('sheet', () => {
  const formed = (changes: object, unclosedAreaMm2 = 0) =>
    checkWith(checkSheet, (input) => {
      const zone = { minMm: 0.6, minAt: at(0), q05Mm: 0.6, marginPercent: 20, meshErrorPercent: 1, belowLimitAreaMm2: 0, areaMm2: 100, place: 'wall', ...changes }; // prettier-ignore
      const report = { ...zone, part: zone, foot: null, footHeightMm: 2, unclosedAreaMm2 };
      const sheet = { report, outcome: 'converged', formedAreaMm2: 100, minPlace: 'wall', webAt: null };
      input.sheet = { formed: sheet, neededMm: 0.44, remedy: null, footRemedy: null } as never;
    });

  it('is looked at from half a per cent that does not close on', () => {
    expect([formed({}, 0.4975).status, formed({}, 0.5025).status]).toEqual(['pass', 'caution']);
    expect(formed({}, 0.4975).message).not.toContain('does not close');
    expect(formed({}, 0.5025).message).toContain('0.5 % of the sheet does not close');
  });

  it('takes the margin off: 6 mm less 20 % is 4.8 mm', () => {
    expect(formed({ minMm: 6 }).message).toContain('it is 4.8 mm at least');
  });

  it('fails where half the nodes see it too: 0.28 mm and 25 % are 0.35 mm', () => {
    const status = (meshErrorPercent: number) => formed({ minMm: 0.28, meshErrorPercent }).status;
    expect([status(24.9), status(25.1)]).toEqual(['fail', 'caution']);
  });
});
