import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import { stepThroughMm } from '@/lib/formability/physics/layer-surface';
import type { RecipeInput } from '@/lib/formability/recipe';
import type { Report } from '@/lib/formability/report';
import { summarise } from '@/lib/formability/summarise';
import { carved, rectangle, turnedRing } from '../../../fixtures/meshes/carved';
import { dome, frustum } from '../../../fixtures/meshes/solids';
import { moved, scaled, together, turned, type Triangles } from '../../../fixtures/meshes/triangles';
import { binaryStl } from '../../../fixtures/meshes/write-stl';
import { checkOf, reportOn } from '../run-engine';

const coarse = { grid: { cellMm: 1.5, sheetNodes: 16 } } satisfies RecipeInput;
const body = frustum(90, 70, 30, 8);
const known = new Map<Triangles, Map<string, Report>>();
/** The report on a mesh, made once for each recipe. */
const of = (recipe: RecipeInput = {}, mesh = body): Report => {
  const ofMesh = known.get(mesh) ?? new Map<string, Report>();
  known.set(mesh, ofMesh);
  const key = JSON.stringify(recipe);
  const report = ofMesh.get(key) ?? reportOn(mesh, { ...coarse, ...recipe });
  ofMesh.set(key, report);
  return report;
};
const formed = (mesh: Triangles, recipe: RecipeInput = {}) =>
  analyse(binaryStl(mesh), { ...coarse, ...recipe }, { sheet: true }).report;

/** A block 30 high with a pit 40 × 30 down to z 10 and a bore of 1.2 mm from its floor to the bed. */
const vented = carved(rectangle(80, 60), 30, [
  { ring: rectangle(40, 30), z: 10, pockets: [{ ring: turnedRing(0.6, 32, 0, 0), z: 0 }] },
]);

describe('layers through the sheet', () => {
  const shallow = { print: { layerMm: 0.1 }, sheet: { gaugeMm: 0.3, minFormedMm: 0.1 } };
  const top = dome(40, 32, 24);

  it('the highest step that comes through, from the mean thickness where the sheet was not run', () => {
    const { layers, plan } = of(shallow, top);
    expect(layers.show).toMatchObject({ from: 'areal-mean', at: null, limitMm: 0.05 });
    expect(layers.show?.thicknessMm).toBeCloseTo(0.3 / plan.arealDrawRatio, 9);
    expect(layers.show?.throughMm).toBeCloseTo(
      stepThroughMm(0.1, layers.show?.draftDeg ?? 0, layers.show?.thicknessMm ?? 0),
      12,
    );
    expect(layers.show?.throughMm).toBeLessThanOrEqual(layers.show?.cuspMm ?? 0);
  });

  it('asks for a layer that hides them, or for sanding, and either mends it', () => {
    const recipe = { ...shallow, limits: { layerMinMm: 0.02 } };
    const check = checkOf(of(recipe, top), 'layers');
    expect(check).toMatchObject({ status: 'caution', limit: 0.05 });
    const layerMm = Number(/layers of ([\d.]+) mm, or sand/.exec(check.remedy)?.[1]);
    expect(layerMm).toBeLessThan(0.1);
    const again = (print: object) =>
      checkOf(of({ ...recipe, print: { ...recipe.print, ...print } }, top), 'layers');
    expect(again({ layerMm }).status).toBe('pass');
    expect(again({ layerMm: layerMm + 0.011 }).status).toBe('caution');
    expect(again({ sanded: true }).status).toBe('pass');
  });

  it('with the sheet run it takes the thickness of the place and says where', () => {
    const { layers, sheet } = formed(top, shallow);
    expect(layers.show?.from).toBe('sheet-run');
    expect(layers.show?.at).toHaveLength(3);
    expect(layers.show?.thicknessMm).toBeGreaterThan((sheet?.q01Mm ?? 1) * 0.9);
    expect(layers.show?.thicknessMm).toBeLessThan(0.31);
  });

  it('on steep walls nothing shows, but beads grip: the bulge asks for less draft than the groove assumed', () => {
    const { show, layerDraftDeg } = of().layers;
    expect(show?.throughMm).toBeLessThan(1e-9);
    expect(show?.areaMm2).toBe(0);
    expect(show?.bulgeMm).toBeGreaterThan(0);
    expect(show?.bulgeDraftDeg).toBeLessThan(layerDraftDeg);
  });
});

describe('heat, pull by pull', () => {
  it('the first touch is the contact temperature; later pulls are hotter; deep down it is cooler', () => {
    const { heat } = of({ run: { pulls: 20 } });
    expect(heat?.transient.surfaceC[0]).toBeCloseTo(heat?.contactC ?? 0, 0);
    expect(heat?.transient.peakC).toBeGreaterThan((heat?.contactC ?? 0) + 5);
    const last = heat?.transient.profile.map((one) => one.lastC) ?? [];
    expect(last.length).toBeGreaterThan(6);
    for (let k = 1; k < last.length; k++) expect(last[k]).toBeLessThanOrEqual(last[k - 1] + 1e-9);
    expect(heat?.transient.surfaceAtDemouldC).toBeLessThan(heat?.contactC ?? 0);
  });

  it('PLA softens to a depth, and no cooling on a cold template is faster than the formula says', () => {
    const { heat } = of({ print: { material: 'pla' }, run: { pulls: 5 } });
    expect(heat?.transient.softensToMm).toBeGreaterThan(0.5);
    expect(heat?.transient.setFirstS).toBeGreaterThan(heat?.coolS ?? Infinity);
    expect(of({ run: { ambientC: 90 } }).heat?.coolS).toBeNull();
  });

  it('asks for a look where only the pulls followed one by one pass the limit', () => {
    // The lump cools out between pulls and says no more than the first touch.
    const report = of({ print: { material: 'pc' }, sheet: { gaugeMm: 0.5, minFormedMm: 0.2 } });
    const check = checkOf(report, 'heat');
    expect(check.measured).toBeLessThan((check.limit ?? 0) - 10);
    expect(report.heat?.transient.peakC).toBeGreaterThan((check.limit ?? 0) - 10);
    expect(check.status).toBe('caution');
    expect(check.remedy).not.toBe('');
  });
});

describe('vent marks, thinning and webs', () => {
  it('marks stand on the thickness as formed there where the sheet was run, on the mean otherwise', () => {
    const [plain] = of({}, vented).ventMarks;
    expect(plain).toMatchObject({ from: 'areal-mean', limitMm: plain.thicknessMm });
    const report = formed(vented);
    const [local] = report.ventMarks;
    expect(local.from).toBe('sheet-run');
    expect(local.thicknessMm).not.toBeCloseTo(plain.thicknessMm, 2);
    expect(local.tipMm).toBeLessThanOrEqual(local.thicknessMm);
    expect(checkOf(report, 'vents').limit).toBe(local.limitMm);
  });

  it('rules stand beside the run: skirt by hand, the pit with its own figure', () => {
    const report = formed(vented);
    const skirt = report.thinning?.find((one) => one.rule === 'skirt');
    // Top land and pit floor keep the gauge: 80 × 60 less the bore; walls and bed share the rest.
    const { frameAreaMm2, formedAreaMm2 } = report.plan;
    const topArea = 80 * 60 - Math.PI * 0.6 ** 2;
    expect((skirt?.ruleMm ?? 0) / ((0.8 * (frameAreaMm2 - topArea)) / (formedAreaMm2 - topArea))).toBeCloseTo(
      1,
      2,
    );
    const pit = report.thinning?.find((one) => one.rule.startsWith('pit'));
    expect(pit?.at?.[2]).toBeCloseTo(10, 6);
    expect(pit?.sheetMm).toBeGreaterThan(0);
  });

  it('the ring round a template: perimeter of its outline, hoop and meridian stretch by hand', () => {
    const { web } = of();
    const ring = web?.outside;
    expect(Math.abs((ring?.perimeterMm ?? 0) / 320 - 1)).toBeLessThan(0.02);
    expect(ring?.ringMm).toBeCloseTo((30 * 30) / 60, 6);
    expect(ring?.hoopStretch).toBeCloseTo(1 / (1 + (2 * Math.PI * 15) / (ring?.perimeterMm ?? 1)), 9);
    expect(ring).toMatchObject({ meridianStretch: 2, webs: false, gapThatHoldsMm: null });
    expect(web?.neighbours).toBeNull();
  });

  it('a small one in a wide frame may web, and the gap that it is told is the widest that does not', () => {
    const low = frustum(40, 40, 12, 8);
    const web = (marginMm: number) => of({ machine: { frameMarginMm: marginMm } }, low);
    const report = web(90);
    expect(report.web?.outside?.webs).toBe(true);
    expect(checkOf(report, 'spacing').message).toContain('may fold at the corners');
    const gap = report.web?.outside?.gapThatHoldsMm ?? 0;
    expect(web(0.98 * gap).web?.outside?.webs).toBe(false);
    expect(web(1.02 * gap).web?.outside?.webs).toBe(true);
  });

  it('between neighbours each side has half of the gap, the ring goes round the smaller one', () => {
    const two = together(frustum(40, 40, 30, 5), moved(frustum(30, 30, 20, 5), 50, 0, 0));
    const { web, spacing } = of({}, two);
    expect(spacing).toHaveLength(1);
    const ring = web?.neighbours;
    expect(ring?.gapMm).toBeCloseTo(spacing[0].gapAtBedMm / 2, 9);
    expect(ring?.heightMm).toBe(spacing[0].heightMm);
    // Halfway up the lower one its side is 30 − 2 · 10 tan 5° = 28.25 mm.
    expect(Math.abs((ring?.perimeterMm ?? 0) / 113 - 1)).toBeLessThan(0.06);
    expect(ring?.meridianStretch).toBeCloseTo(((ring?.gapMm ?? 0) + 20) / (ring?.gapMm ?? 1), 6);
  });
});

describe('walls and infill', () => {
  it('infill walls that buckle ask for more infill, and that mends it', () => {
    const recipe = { print: { material: 'pla', infillPercent: 5, infillPattern: 'grid' }, run: { pulls: 1, ambientC: 10 }, sheet: { material: 'pla', formingC: 60 } } satisfies RecipeInput; // prettier-ignore
    const report = of(recipe);
    const { infill, infillThatHoldsPercent } = report.wallsUnderPressure ?? {};
    expect(infill?.stressMPa).toBeCloseTo(0.4 / 0.05, 9);
    expect(infill?.stressMPa).toBeGreaterThan(infill?.bucklesMPa ?? Infinity);
    const check = checkOf(report, 'walls');
    expect(check.status).not.toBe('pass');
    const percent = Number(/infill of (\d+) %/.exec(check.remedy)?.[1]);
    expect(percent).toBe(Math.ceil(infillThatHoldsPercent ?? 0));
    const again = (infillPercent: number) => of({ ...recipe, print: { ...recipe.print, infillPercent } });
    expect(checkOf(again(percent), 'walls').status).toBe('pass');
    expect(checkOf(again(percent - 2), 'walls').status).not.toBe('pass');
  });

  it('a solid print has no span: nothing sinks, gives or buckles between lines', () => {
    for (const infillPattern of ['lines', 'grid', 'triangles', 'gyroid'] as const) {
      const report = of({ print: { infillPattern, infillPercent: 100 } });
      expect(report.skin).toMatchObject({ spanMm: 0, sagMm: 0, sagMostMm: 0 });
      expect(report.wallsUnderPressure).toMatchObject({ sagMm: 0, infill: null, ribSpacingMm: null });
      expect([checkOf(report, 'skin').status, checkOf(report, 'walls').status]).toEqual(['pass', 'pass']);
    }
  });

  it('skin: clamped is the least, edges that turn the most', () => {
    for (const infillPattern of ['lines', 'grid', 'triangles', 'gyroid'] as const) {
      const { skin } = of({ print: { infillPattern, infillPercent: 12, topMm: 1 } });
      expect(skin?.sagMostMm).toBeGreaterThan(skin?.sagMm ?? Infinity);
      expect(skin).toMatchObject({ creepFactor: 3 });
    }
  });
});

describe('life', () => {
  const life = (recipe: RecipeInput = {}, pullLog?: unknown) =>
    analyse(binaryStl(body), { ...coarse, ...recipe }, { pullLog }).report.life;

  it('margins in their own unit and as ratios, the least of them named', () => {
    const found = life();
    expect(found?.margins.map((one) => one.way)).toEqual(['heat', 'skin', 'walls', 'grip']);
    for (const { demand, holds, margin, ratio, way } of found?.margins ?? []) {
      if (way !== 'grip') expect(margin).toBeCloseTo(holds - (demand ?? NaN), 9);
      expect(ratio).toBeGreaterThan(0);
    }
    const least = found?.margins.reduce((a, b) => ((b.ratio ?? Infinity) < (a.ratio ?? Infinity) ? b : a));
    expect(found?.limitedBy).toBe(least?.way);
    expect(found).toMatchObject({ basis: 'estimate', pulls: 50, log: null });
    expect(found?.text).toContain('unknown');
  });

  it('heat that passes its limit leaves the pulls before it; the first touch leaves none', () => {
    const hot = of({ print: { material: 'pc' }, run: { pulls: 60, cycleS: 40 } });
    expect(hot.life?.margins[0]).toMatchObject({ way: 'heat' });
    expect(hot.life?.margins[0].ratio).toBeLessThan(1);
    expect(hot.life?.pulls).toBeGreaterThan(0);
    expect(hot.life?.pulls).toBeLessThanOrEqual(hot.heat?.pullsBeforeRest ?? 0);
    expect(life({ print: { material: 'pla' } })?.pulls).toBe(0);
  });

  it('grip: less draft holds more, by the force of the shrunk ring', () => {
    const steep = of({}, frustum(90, 70, 30, 3)).life;
    const lean = of({}, frustum(90, 70, 30, 6)).life;
    expect(steep?.releaseForceN).toBeGreaterThan(lean?.releaseForceN ?? Infinity);
    expect(of({ print: { releaseAgent: 'none' } }, frustum(90, 70, 30, 6)).life?.releaseForceN).toBeGreaterThan(lean?.releaseForceN ?? Infinity); // prettier-ignore
    expect(of({}, frustum(90, 70, 30, 20)).life?.releaseForceN).toBe(0);
  });

  it('a pull log stands in its place, and is said to be the studio’s', () => {
    const log = [12, 18, 27, 31, 44, 52].map((pulls) => ({ pulls, failed: true }));
    const found = life({}, [...log, { pulls: 60, failed: false }]);
    expect(found).toMatchObject({ basis: 'pull-log', log: { templates: 7, failures: 6 } });
    expect(found?.pulls).toBe(Math.floor(found?.log?.weibull?.b10Pulls ?? 0));
    expect(life({}, [{ pulls: 60, failed: false }])).toMatchObject({ pulls: 26, log: { weibull: null } });
    // Before the mesh is looked at: nobody waits for a run to learn it.
    const noMesh = new Uint8Array(0);
    expect(() => analyse(noMesh, {}, { pullLog: 'many' })).toThrow(
      /pull log cannot be used: it is not a list/,
    );
  });
});

describe('how sure the figures are', () => {
  it('every check and every section says it', () => {
    const report = of();
    for (const { basis, id } of report.checks) expect(basis.sureness?.note.length, id).toBeGreaterThan(10);
    for (const { note } of Object.values(report.sureness)) expect(note).not.toBe('');
    expect(report.sureness).toMatchObject({
      plan: { kind: 'source' },
      heat: { kind: 'estimate' },
      air: { kind: 'estimate' },
    });
  });

  it('the studio’s own hole model, costs, limits and log are calibrations', () => {
    const own = {
      print: { holeModel: { offsetMm: -0.13 } },
      costs: { labour: 11 },
      limits: { draftMinDeg: 4 },
    };
    const report = of(own);
    expect(report.sureness).toMatchObject({ air: { kind: 'calibrated' }, print: { kind: 'calibrated' } });
    expect(checkOf(report, 'draft').basis.sureness?.kind).toBe('calibrated');
    expect(checkOf(report, 'vents').basis.sureness?.kind).toBe('calibrated');
    expect(checkOf(report, 'heat').basis.sureness?.kind).toBe('estimate');
    expect(checkOf(of(), 'edges').basis.sureness?.kind).toBe('source');
  });

  it('the page for the designer shows life and sureness', () => {
    const page = summarise(of(), 'part.stl');
    expect(page).toContain('Life of the template:');
    expect(page).toMatch(/How sure the figures are:\n {2}from a source: draft, draw\./);
    expect(page).toMatch(/by rule +skirt [\d.]+ mm, (foot|drape) [\d.]+ mm \(estimate\)/);
    expect(page).toMatch(/heat +\d+ °C at the first touch, .* \(estimate\)/);
  });

  it('geometry alone has neither', () => {
    const { report } = analyse(binaryStl(body), coarse, { geometryOnly: true });
    expect(report).toMatchObject({ life: null, web: null, thinning: null, layers: { show: null } });
    expect(summarise(report, 'part.stl')).not.toContain('Life of the template');
  });
});

describe('metamorphic', () => {
  /** Sections of the forming itself, without places. */
  const physics = ({ heat, skin, wallsUnderPressure, layers, web, life, thinning }: Report) => ({
    heat,
    skin,
    wallsUnderPressure,
    show: layers.show?.throughMm,
    margins: life?.margins.map((one) => one.ratio),
    force: life?.releaseForceN,
    hoop: web?.outside?.hoopStretch,
    thinning: thinning?.map((one) => one.ruleMm),
  });
  const near = (a: unknown, b: unknown, relative: number, path = ''): void => {
    if (typeof a === 'number' && typeof b === 'number')
      expect(Math.abs(a - b), `${path}: ${a} and ${b}`).toBeLessThanOrEqual(relative * Math.max(Math.abs(a), Math.abs(b), 1e-9)); // prettier-ignore
    else if (a !== null && typeof a === 'object')
      for (const key of Object.keys(a))
        near((a as never)[key], (b as never)[key], relative, `${path}.${key}`);
    else expect(a, path).toEqual(b);
  };
  const base = physics(of());

  it('a turned template has the same physics', () => near(physics(of({}, turned(body, 90))), base, 3e-3));

  it('so has one that is drawn in inches', () =>
    near(physics(of({ mesh: { unit: 'in' } }, scaled(body, 1 / 25.4))), base, 3e-3));

  it('doubled gauge: heat of a pull, vent limits and rules double', () => {
    const [one, two] = [0.8, 1.6].map((gaugeMm) => of({ sheet: { gaugeMm }, run: { cycleS: 4000, pulls: 1 }, print: { material: 'resin-ht' } }, vented)); // prettier-ignore
    expect(two.ventMarks[0].limitMm / one.ventMarks[0].limitMm).toBeCloseTo(2, 9);
    one.thinning?.forEach(({ ruleMm }, k) =>
      expect((two.thinning?.[k].ruleMm ?? 0) / ruleMm).toBeCloseTo(2, 9),
    );
    expect(two.heat?.contactC).toBe(one.heat?.contactC);
    // Four times as long to set on a cold template: its own time goes with the square.
    expect((two.heat?.coolS ?? 0) / (one.heat?.coolS ?? 1)).toBeCloseTo(4, 9);
    expect((two.life?.releaseForceN ?? 0) / (one.life?.releaseForceN ?? 1)).toBeCloseTo(2, 9);
  });

  it('doubled pressure: sag and stress double, what holds stays', () => {
    const [one, two] = [2, 4].map((pressureBar) => of({ machine: { pressureBar } }));
    expect((two.skin?.sagMm ?? 0) / (one.skin?.sagMm ?? 1)).toBeCloseTo(2, 9);
    expect((two.skin?.stressMPa ?? 0) / (one.skin?.stressMPa ?? 1)).toBeCloseTo(2, 9);
    expect(two.wallsUnderPressure?.infill?.bucklesMPa).toBe(one.wallsUnderPressure?.infill?.bucklesMPa);
    expect(two.heat).toEqual(one.heat);
    expect((two.layers.show?.bulgeMm ?? 0) / (one.layers.show?.bulgeMm ?? 1)).toBeCloseTo(2, 9);
  });
});
