import { describe, expect, it } from 'vitest';
import type { RecipeInput } from '@/lib/formability/recipe';
import { carved, rectangle } from '../../../fixtures/meshes/carved';
import { openFrustum } from '../../../fixtures/meshes/hollow';
import { box, extrude, frustum } from '../../../fixtures/meshes/solids';
import { moved, together, type Triangles } from '../../../fixtures/meshes/triangles';
import { analysed } from '../acceptance/claims';
import { checkOf } from '../run-engine';

/** Lines are 1.125 nozzles wide; a solid wants two of them, a gap one (common practice, no source). */

const check = (id: 'nozzle' | 'shell' | 'spacing', mesh: Triangles, recipe: RecipeInput = {}) =>
  checkOf(analysed(mesh, { grid: { cellMm: 1 }, ...recipe }), id);
const nozzle = (mesh: Triangles, nozzleMm: number) => check('nozzle', mesh, { print: { nozzleMm } });
const ribbed = (wide: number) => together(frustum(100, 80, 20, 8), moved(box(wide, 20, 8), 80, 0, 0));
const number = (text: string, at: RegExp) => Number(at.exec(text)?.[1]);

describe('nozzle', () => {
  it('a rib of 0.7 mm: 0.7 / 2.25 = 0.311 at most, so 0.3, or a rib of 0.9 mm; both pass', () => {
    const found = nozzle(ribbed(0.7), 0.4);
    expect(found).toMatchObject({ status: 'caution', measured: 0.4, limit: 0.311, unit: 'mm' });
    expect(found.message).toBe(
      'A 0.4 mm nozzle is too wide for 130 mm of length and a finest detail of 0.7 mm (solid).',
    );
    expect(found.remedy).toMatch(/^Use a 0\.3 mm nozzle, or widen the detail at x 80, .* to 0\.9 mm\.$/);
    expect(found.places).toHaveLength(1);
    expect(nozzle(ribbed(0.7), 0.3).status).toBe('pass');
    expect(nozzle(ribbed(0.9), 0.4).status).toBe('pass');
    expect(nozzle(ribbed(0.89), 0.4).status).toBe('caution');
  });

  it('a slot of 0.4 mm closes under lines of 0.45 mm: 0.4 / 1.125 = 0.356, so 0.3; 0.45 mm stays open', () => {
    const slot = (wide: number) => carved(rectangle(100, 80), 20, [{ ring: rectangle(wide, 30), z: 15 }]);
    const found = nozzle(slot(0.4), 0.4);
    expect(found).toMatchObject({ status: 'caution', limit: 0.356 });
    expect(found.message).toContain('0.4 mm (a gap)');
    expect(found.remedy).toMatch(/^Use a 0\.3 mm nozzle, or widen the gap at x 0, .* to 0\.45 mm\.$/);
    expect(nozzle(slot(0.4), 0.3).status).toBe('pass');
    expect(nozzle(slot(0.451), 0.4).status).toBe('pass');
  });

  it('finer than any nozzle: the detail must grow', () => {
    const found = nozzle(ribbed(0.2), 0.4);
    expect(found.remedy).toMatch(
      /^No nozzle is fine enough: widen the detail at .* to 0\.45 mm and use a 0\.2 mm nozzle, or to 0\.9 mm with this one\.$/,
    );
    expect(nozzle(ribbed(0.46), 0.2).status).toBe('pass');
  });

  it('the standard for small ones, larger for large simple ones, by size alone', () => {
    const small = frustum(50, 40, 15, 8);
    const large = frustum(220, 160, 40, 8);
    expect(nozzle(small, 0.6)).toMatchObject({ status: 'caution', limit: 0.4, remedy: 'Use a 0.4 mm nozzle.', places: [] }); // prettier-ignore
    expect(nozzle(small, 0.25).status).toBe('pass');
    expect(nozzle(large, 0.6).status).toBe('pass');
    expect(nozzle(large, 0.8)).toMatchObject({
      status: 'caution',
      limit: 0.6,
      remedy: 'Use a 0.6 mm nozzle.',
    });
    expect(nozzle(large, 0.4).message).toMatch(/^A 0\.4 mm nozzle suits 220 mm of length .* Up to 0\.6 mm would do/); // prettier-ignore
  });

  it('a fine nozzle over a large template is slow, unless a detail wants it', () => {
    const large = frustum(220, 160, 40, 8);
    expect(nozzle(large, 0.2)).toMatchObject({ status: 'caution', measured: 0.2, limit: 0.4, remedy: 'Use a 0.4 mm nozzle.' }); // prettier-ignore
    expect(nozzle(together(large, moved(box(0.5, 20, 8), 140, 0, 0)), 0.2).status).toBe('pass');
    const between = nozzle(together(large, moved(box(0.6, 20, 8), 140, 0, 0)), 0.2);
    expect(between.remedy).toBe('Use a 0.25 mm nozzle.');
  });
});

describe('shell', () => {
  const large = frustum(220, 160, 40, 8);
  const shell = (print: RecipeInput['print'], mesh = large) => check('shell', mesh, { print });

  it('3 to 5 mm on a large template', () => {
    expect(shell({ shellMm: 2, topMm: 2.5 })).toMatchObject({
      status: 'caution',
      measured: 2,
      limit: 3,
      remedy: 'Make the walls 3 mm thick and the top 3 mm thick.',
    });
    expect(shell({ shellMm: 2, topMm: 2.5 }).message).toBe(
      'The recipe prints walls of 2 mm and a top of 2.5 mm, less than the 3 mm that a template of this size needs.',
    );
    expect(shell({ shellMm: 3, topMm: 3 })).toMatchObject({
      status: 'pass',
      measured: 3,
      limit: 3,
      remedy: '',
    });
    expect(shell({ shellMm: 5, topMm: 5 }).status).toBe('pass');
    expect(shell({ shellMm: 5.5, topMm: 6 })).toMatchObject({
      status: 'caution',
      measured: 5.5,
      limit: 5,
      remedy: 'Reduce shell and top to 5 mm.',
      basis: { limitKey: 'shellMaxMm' },
    });
  });

  it('a top as thick as the walls, a layer aside', () => {
    expect(shell({ shellMm: 4, topMm: 3.85, layerMm: 0.15 }).status).toBe('pass');
    const thin = shell({ shellMm: 4, topMm: 3.5, layerMm: 0.15 });
    expect(thin).toMatchObject({ status: 'caution', measured: 3.5, remedy: 'Make the top 4 mm thick, like the walls.' }); // prettier-ignore
    expect(thin.limit).toBeCloseTo(3.85, 9);
  });

  it('a hollow model is told what to draw, measured along the normal', () => {
    const hollow = shell({ shellMm: 4, topMm: 4 }, openFrustum(220, 160, 40, 8, 2, 3.5));
    expect(hollow.status).toBe('caution');
    expect(hollow.measured).toBeCloseTo(2, 3);
    expect(hollow.remedy).toBe('Make the walls 3 mm thick in the model.');
    expect(shell({ shellMm: 4, topMm: 4 }, openFrustum(220, 160, 40, 8, 3, 3)).status).toBe('pass');
  });

  it('two lines on a small one; solid prints have no shell', () => {
    const small = frustum(100, 80, 30, 8);
    expect(shell({ shellMm: 0.8, topMm: 1.2 }, small)).toMatchObject({ status: 'caution', measured: 0.8, limit: 0.9, remedy: 'Make the walls 0.9 mm thick.' }); // prettier-ignore
    expect(shell({ shellMm: 0.9, topMm: 0.9 }, small).status).toBe('pass');
    expect(shell({ shellMm: 1, topMm: 1, infillPercent: 100 })).toMatchObject({
      status: 'pass',
      measured: null,
    });
  });
});

describe('spacing', () => {
  const towers = (gap: number, low: number) => together(box(30, 40, 45), moved(box(30, 40, low), 30 + gap, 0, 0)); // prettier-ignore

  it('30 mm over 20: 1.5; wider by its remedy, or lower, it passes', () => {
    const found = check('spacing', towers(20, 30));
    expect(found).toMatchObject({ status: 'caution', limit: 1, unit: 'height/gap' });
    expect(found.measured).toBeCloseTo(1.5, 4);
    expect(found.remedy).toBe('Widen the gap to 30 mm, or lower the shorter neighbour to 20 mm.');
    expect(found.message).toBe(
      'A gap is too narrow for the height beside it: the sheet bridges 20 mm between features 30 mm high and may fold into a web.',
    );
    const wider = number(found.remedy, /gap to ([\d.]+)/);
    const lower = number(found.remedy, /neighbour to ([\d.]+)/);
    expect(check('spacing', towers(wider, 30)).status).toBe('pass');
    expect(check('spacing', towers(20, lower)).status).toBe('pass');
  });

  it('beyond 1.75 of the limit a web is certain; the limit moves with the studio', () => {
    expect(check('spacing', towers(20, 34)).status).toBe('caution');
    expect(check('spacing', towers(20, 36)).status).toBe('fail');
    const moved = check('spacing', towers(20, 36), { limits: { heightOverGapMax: 2 } });
    expect(moved).toMatchObject({ status: 'pass', limit: 2, basis: { movedByRecipe: true } });
  });

  it('a groove in a block is a pair: its sides are as high as it is deep', () => {
    const groove = (wide: number): [number, number][] => [[-60, 0], [60, 0], [60, 30], [wide / 2, 30], [wide / 2, 12], [-wide / 2, 12], [-wide / 2, 30], [-60, 30]]; // prettier-ignore
    const found = check('spacing', extrude(groove(12), 80));
    expect(found.status).toBe('caution');
    expect(found.measured).toBeCloseTo(18 / 12, 3);
    expect(check('spacing', extrude(groove(18.5), 80)).status).toBe('pass');
  });

  it('without neighbours there is nothing to compare', () => {
    expect(check('spacing', box(60, 40, 20))).toMatchObject({ status: 'pass', measured: null, remedy: '' });
  });
});
