import { describe, expect, it } from 'vitest';
import { LIMIT_KEYS } from '@/lib/formability/limits';
import { CHECK_IDS } from '@/lib/formability/report';
import { box, extrude, frustum, lathe } from '../../../fixtures/meshes/solids';
import { moved, scaled, together } from '../../../fixtures/meshes/triangles';
import { checkOf, reportOn } from '../run-engine';

const coarse = { grid: { cellMm: 0.8 } };
const sanded = { ...coarse, print: { sanded: true } };
const number = (text: string) => Number(/\d+(\.\d+)?/.exec(text)?.[0]);

describe('every check', () => {
  const report = reportOn(frustum(120, 90, 40, 8), coarse);

  it('is in the report once, in the order of the contract', () => {
    expect(report.checks.map((check) => check.id)).toEqual([...CHECK_IDS]);
  });

  it('has a sentence, a basis, and a remedy where it does not pass', () => {
    for (const check of reportOn(frustum(120, 90, 40, 1), coarse).checks) {
      expect(check.message.length, check.id).toBeGreaterThan(20);
      expect(check.message, check.id).not.toMatch(/NaN|undefined|null|Infinity/);
      expect(check.remedy, check.id).not.toMatch(/NaN|undefined|null|Infinity/);
      expect(check.basis.source.length, check.id).toBeGreaterThan(10);
      if (check.status === 'fail' || check.status === 'caution') expect(check.remedy, check.id).toMatch(/\d/);
    }
  });

  it('says plainly what was not asked for', () => {
    const left = report.checks.filter((check) => check.status === 'not-run');
    expect(left.map((check) => check.id)).toEqual(['sheet']);
    for (const check of left) expect(check.message).toContain('was not asked for');
  });

  it('records who moved a limit', () => {
    const moved = reportOn(frustum(120, 90, 40, 4), { ...sanded, limits: { draftMinDeg: 3.5 } });
    expect(checkOf(moved, 'draft')).toMatchObject({ status: 'pass', limit: 3.5 });
    expect(checkOf(moved, 'draft').basis).toMatchObject({ limitKey: 'draftMinDeg', movedByRecipe: true });
    expect(checkOf(report, 'draft').basis.movedByRecipe).toBe(false);
    expect(Object.keys(moved.recipe.limits).sort()).toEqual([...LIMIT_KEYS].sort());
  });
});

describe('draft: 5° and more, or sanding, for layered walls (common practice, no source)', () => {
  it.each([
    [2, 'fail'],
    [4, 'caution'],
    [5, 'pass'],
    [8, 'pass'],
  ])('a sanded wall of %s° is %s', (deg, status) => {
    expect(checkOf(reportOn(frustum(120, 90, 40, deg), sanded), 'draft').status).toBe(status);
  });

  it('unsanded 5° is a caution: 3° and atan(0.01/0.15) = 3.81° for the layers', () => {
    const check = checkOf(reportOn(frustum(120, 90, 40, 5), coarse), 'draft');
    expect(check.status).toBe('caution');
    expect(check.limit).toBeCloseTo(6.814, 2);
    expect(check.remedy).toContain('or sand them');
    expect(checkOf(reportOn(frustum(120, 90, 40, 7), coarse), 'draft').status).toBe('pass');
  });

  it('passes when its remedy is followed', () => {
    const check = checkOf(reportOn(frustum(120, 90, 40, 2), coarse), 'draft');
    expect(check.status).toBe('fail');
    const mended = frustum(120, 90, 40, 2 + number(check.remedy));
    expect(checkOf(reportOn(mended, coarse), 'draft').status).toBe('pass');
  });

  it('names each steep wall with its area', () => {
    const check = checkOf(reportOn(frustum(120, 90, 40, [1, 1, 12, 12]), coarse), 'draft');
    expect(check.places).toHaveLength(2);
    const depth = 90 - 40 * Math.tan((12 * Math.PI) / 180);
    for (const place of check.places) {
      expect(place.areaMm2).toBeCloseTo((40 / Math.cos(Math.PI / 180)) * depth, 1);
      expect(Math.abs(place.at[0])).toBeGreaterThan(59);
    }
  });

  it('leaves bores and cavities alone: the sheet does not touch them', () => {
    const vented = lathe([[0.5, 0], [40, 0], [34, 30], [17, 30], [13, 10], [0.5, 10]], 48); // prettier-ignore
    expect(checkOf(reportOn(vented), 'draft').status).toBe('pass');
    const hollow = lathe([[30, 0], [40, 0], [34, 30], [0, 30], [0, 26], [30, 26]], 48); // prettier-ignore
    const report = reportOn(hollow);
    expect(report.draft.verticalAreaMm2).toBeGreaterThan(4500);
    expect(checkOf(report, 'draft').status).toBe('pass');
  });
});

describe('fit', () => {
  it('passes within 450 × 300 less the margins, is turned where that helps, and fails beyond', () => {
    expect(checkOf(reportOn(box(390, 240, 40), coarse), 'fit').status).toBe('pass');
    const turn = checkOf(reportOn(box(240, 390, 40), coarse), 'fit');
    expect(turn).toMatchObject({ status: 'caution', remedy: 'Turn the template by 90° on the bed.' });
    expect(checkOf(reportOn(box(391, 240, 40), coarse), 'fit')).toMatchObject({
      status: 'fail',
      measured: 451,
      limit: 450,
    });
    expect(checkOf(reportOn(box(100, 100, 121), coarse), 'fit')).toMatchObject({
      status: 'fail',
      measured: 121,
      limit: 120,
    });
  });

  it('passes when its remedy is followed: shrunk to the percentage named', () => {
    const large = box(500, 200, 130);
    const check = checkOf(reportOn(large, coarse), 'fit');
    expect(check.remedy).toMatch(/^Shrink it to 78 %/);
    expect(checkOf(reportOn(scaled(large, number(check.remedy) / 100), coarse), 'fit').status).toBe('pass');
  });
});

describe('undercut', () => {
  const t = [[-10, 0], [10, 0], [10, 20], [30, 20], [30, 30], [-30, 30], [-30, 20], [-10, 20]] as [number, number][]; // prettier-ignore

  it('fails with place and depth, and passes once filled as its remedy says', () => {
    const check = checkOf(reportOn(extrude(t, 60)), 'undercut');
    expect(check).toMatchObject({ status: 'fail', limit: 0.2, unit: 'mm' });
    expect(check.measured).toBeCloseTo(20, 0);
    expect(check.remedy).toMatch(/^Fill the undercut down to the bed \((47\.9\d?|48(\.\d+)?) cm³/);
    expect(check.places).toHaveLength(2);
    expect(checkOf(reportOn(box(60, 60, 30)), 'undercut').status).toBe('pass');
  });
});

describe('draw', () => {
  const thick = { gaugeMm: 2, minFormedMm: 0.35 };

  it('a tall post in a narrow frame asks for less height or a wider margin, and either would do', () => {
    const recipe = { ...coarse, sheet: thick, machine: { frameMarginMm: 20 } };
    const check = checkOf(reportOn(box(40, 40, 110), recipe), 'draw');
    expect(check).toMatchObject({ status: 'caution', limit: 3, unit: 'ratio' });
    // Frame 80 × 80; formed area 80² + 160 h; ratio 3 at h = 80.
    expect(check.measured).toBeCloseTo((6400 + 160 * 110) / 6400, 2);
    expect(check.remedy).toMatch(/^Lower the template to 80 mm, or widen the frame margin to (\d+) mm\.$/);
    const margin = Number(/margin to (\d+)/.exec(check.remedy)?.[1]);
    expect(checkOf(reportOn(box(40, 40, 79.9), recipe), 'draw').status).toBe('pass');
    const wider = { ...recipe, machine: { frameMarginMm: margin } };
    expect(checkOf(reportOn(box(40, 40, 110), wider), 'draw').measured).toBeLessThanOrEqual(3);
  });

  it('fails where even the mean is thinner than the thinnest place may be, and names the gauge that averages it', () => {
    const at = (gaugeMm: number) =>
      checkOf(reportOn(box(60, 60, 30), { ...coarse, sheet: { gaugeMm, minFormedMm: 0.5 } }), 'draw');
    // Frame 120 × 120 = 14 400, formed 14 400 + 4 × 60 × 30 = 21 600: ratio 1.5.
    expect(at(0.7)).toMatchObject({ status: 'fail', limit: 0.5, unit: 'mm' });
    expect(at(0.7).measured).toBeCloseTo(0.7 / 1.5, 3);
    expect(at(0.7).remedy).toContain('take a gauge of 0.75 mm');
    expect(at(0.76).status).toBe('pass');
  });

  it('fails beyond an areal ratio of 5', () => {
    expect(
      checkOf(reportOn(box(20, 20, 115), { ...coarse, sheet: { gaugeMm: 8, minFormedMm: 0.35 }, machine: { frameMarginMm: 5 } }), 'draw').status, // prettier-ignore
    ).toBe('fail');
  });
});

describe('shell, nozzle, overhang, release, print', () => {
  const small = frustum(100, 80, 30, 8);
  const large = frustum(220, 160, 40, 8);
  it('shells of 3 to 5 mm on large templates, the top as thick as the walls', () => {
    const shell = (print: object, mesh = large) => checkOf(reportOn(mesh, { ...coarse, print }), 'shell');
    expect(shell({ shellMm: 4, topMm: 4 }).status).toBe('pass');
    expect(shell({ shellMm: 2, topMm: 4 })).toMatchObject({
      status: 'caution',
      remedy: 'Make the walls 3 mm thick.',
    });
    expect(shell({ shellMm: 4, topMm: 3 })).toMatchObject({ status: 'caution', remedy: 'Make the top 4 mm thick, like the walls.' }); // prettier-ignore
    expect(shell({ shellMm: 8, topMm: 8 }).status).toBe('caution');
    expect(shell({ shellMm: 1.2, topMm: 1.2 }, small).status).toBe('pass');
    expect(shell({ shellMm: 0.8, topMm: 1.2 }, small).status).toBe('caution');
  });

  it('a 0.4 mm nozzle is the standard; a rib of 0.7 mm asks for a finer one', () => {
    const nozzle = (mesh: number[], nozzleMm: number) =>
      checkOf(reportOn(mesh, { print: { nozzleMm } }), 'nozzle');
    expect(nozzle(small, 0.4).status).toBe('pass');
    expect(nozzle(small, 0.8).status).toBe('caution');
    expect(nozzle(large, 0.6).status).toBe('pass');
    const rib = together(frustum(50, 50, 10, 8), moved(box(0.7, 20, 15), 40, 0, 0));
    const check = nozzle(rib, 0.4);
    expect(check.status).toBe('caution');
    expect(check.remedy).toMatch(/^Use a 0\.(25|3) mm nozzle/);
  });

  it('overhangs beyond 45° from vertical need support; 45° itself does not', () => {
    const lip = (deg: number) => lathe([[0, 0], [20, 0], [20, 10], [20 + 10 * Math.tan((deg * Math.PI) / 180), 20], [20, 30], [0, 30]], 64); // prettier-ignore
    expect(checkOf(reportOn(lip(44), coarse), 'overhang').status).toBe('pass');
    const check = checkOf(reportOn(lip(60), coarse), 'overhang');
    expect(check.status).toBe('caution');
    expect(check.measured).toBeCloseTo(60, 0);
  });

  it('advises dry PTFE on steep unsanded walls, and warns when the recipe has none', () => {
    const release = (deg: number, print: object) => checkOf(reportOn(frustum(120, 90, 40, deg), { ...coarse, print }), 'release'); // prettier-ignore
    expect(release(4, { releaseAgent: 'none' }).status).toBe('caution');
    expect(release(4, { releaseAgent: 'dry-ptfe' })).toMatchObject({ status: 'pass' });
    expect(release(4, { releaseAgent: 'dry-ptfe' }).remedy).toContain('touch-dry');
    expect(release(12, { releaseAgent: 'none', sanded: true }).status).toBe('pass');
  });

  it('print is an estimate with no limit', () => {
    expect(checkOf(reportOn(small, coarse), 'print')).toMatchObject({
      status: 'pass',
      limit: null,
      unit: 's',
    });
  });
});

describe('mesh', () => {
  it('passes a sound mesh, cautions what was mended, fails what must be', () => {
    const status = (mesh: number[]) => checkOf(reportOn(mesh, coarse), 'mesh').status;
    const solid = frustum(100, 80, 30, 8);
    expect(status(solid)).toBe('pass');
    expect(status(together(solid, solid.slice(0, 9)))).toBe('caution');
    expect(status(solid.slice(0, -9))).toBe('fail');
    expect(checkOf(reportOn(scaled(solid, 1 / 25.4)), 'mesh').remedy).toContain('scale by 25.4');
  });
});
