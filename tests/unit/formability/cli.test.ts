import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import type { Report } from '@/lib/formability/report';
import { frustum } from '../../fixtures/meshes/solids';
import { plain3mf } from '../../fixtures/meshes/write-3mf';
import { cylindersStep } from '../../fixtures/meshes/write-step';
import { binaryStl } from '../../fixtures/meshes/write-stl';

const root = path.resolve(import.meta.dirname, '../../..');
const folder = mkdtempSync(path.join(tmpdir(), 'formability-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function file(name: string, content: Uint8Array | string): string {
  const at = path.join(folder, name);
  writeFileSync(at, content);
  return at;
}

function run(...args: string[]): { status: number | null; out: string; err: string } {
  const done = spawnSync(process.execPath, ['--import', 'tsx', 'lib/formability/cli.ts', ...args], {
    cwd: root,
    encoding: 'utf8',
  });
  return { status: done.status, out: done.stdout, err: done.stderr };
}

const good = file('good.stl', binaryStl(frustum(60, 40, 20, 4)));

describe('npm run formability', () => {
  it('prints the report, and nothing else, with --json; a failing template is still exit 0', () => {
    const { status, out, err } = run(good, '--json');
    const report = JSON.parse(out) as Report;
    expect([status, err]).toEqual([0, '']);
    expect(report.input.triangles).toBe(12);
    expect(report.timings.parseMs).toBeGreaterThanOrEqual(0);
  });

  it('takes a pull log in the place of the estimated life, and says what is wrong with one', () => {
    const log = file('log.json', JSON.stringify([{ pulls: 80, failed: false }]));
    const { status, out } = run(good, '--pull-log', log);
    expect(status).toBe(0);
    expect(out).toMatch(/By 1 logged\s+template, 0 of them worn out/);
    expect(out).toContain('calibrated by the studio: life');
    const broken = run(good, '--pull-log', file('broken.json', '[{"pulls":-3,"failed":true}]'));
    expect(broken).toMatchObject({ status: 2, out: '' });
    expect(broken.err).toContain('error: invalid_recipe: the pull log cannot be used: entry 1 has pulls -3');
    expect(run(good, '--pull-log').err).toContain('--pull-log needs a file');
  });

  it('refuses a material that the library has not', () => {
    const { status, err } = run(good, '--recipe', file('wood.json', '{"print":{"material":"wood"}}'));
    expect(status).toBe(2);
    expect(err).toContain(
      'error: invalid_recipe: the recipe cannot be used: print.material: unknown filament "wood"',
    );
  });

  it('prints a page to read without it', () => {
    const { status, out, err } = run(good, '--geometry-only');
    expect([status, err]).toEqual([0, '']);
    expect(out).toContain('60.0 × 40.0 × 20.0 mm');
    expect(out).toMatch(/LOOK draft/);
    expect(out).toContain('only geometry was asked for');
    expect(
      Math.max(
        ...out
          .split('\n')
          .slice(3)
          .map((line) => line.length),
      ),
    ).toBeLessThanOrEqual(100);
  });

  it('reads 3MF and STEP by their content, whatever they are called', () => {
    const mesh = file('mesh.bin', plain3mf(frustum(60, 40, 20, 4)));
    const surfaces = file('surfaces.bin', cylindersStep([[0, 0, 20, 10]]));
    const [as3mf, asStep] = [mesh, surfaces].map((path) => JSON.parse(run(path, '--json').out) as Report);
    expect(as3mf.input).toMatchObject({ format: '3mf', triangles: 12 });
    expect(asStep.input).toMatchObject({ format: 'step', bodies: 1 });
    expect(asStep.timings.convertMs).toBeGreaterThan(0);
    expect(run(surfaces).out).toContain('curved surfaces cut into facets within 0.006 mm');
  });

  it('takes a recipe', () => {
    const recipe = file(
      'recipe.json',
      JSON.stringify({ sheet: { gaugeMm: 1.5 }, limits: { draftMinDeg: 3 } }),
    );
    const report = JSON.parse(run(good, '--recipe', recipe, '--json').out) as Report;
    expect(report.recipe.sheet.gaugeMm).toBe(1.5);
    expect(report.recipe.limits.draftMinDeg).toBe(3);
  });

  it.each([
    ['a broken mesh', [file('bad.stl', binaryStl(frustum(60, 40, 20, 4)).slice(0, 300))], 'truncated'],
    ['a broken 3MF', [file('bad.3mf', plain3mf(frustum(60, 40, 20, 4)).slice(0, 300))], 'truncated'],
    ['a broken STEP file', [file('bad.step', cylindersStep([[0, 0, 20, 10]]).slice(0, 900))], 'truncated'],
    ['a missing file', [path.join(folder, 'none.stl')], 'unreadable'],
    ['a folder', [folder], 'unreadable'],
    [
      'an unknown material',
      [good, '--recipe', file('steel.json', '{"sheet":{"material":"steel"}}')],
      'invalid_recipe',
    ],
    ['a recipe that is no JSON', [good, '--recipe', file('no.json', '{')], 'invalid_recipe'],
    ['an unknown option', [good, '--fast'], 'usage'],
    ['no mesh', [], 'usage'],
  ])('refuses %s with exit 2 and one line', (_, args, code) => {
    const { status, out, err } = run(...args, '--json');
    expect(status).toBe(2);
    expect(err).toMatch(new RegExp(`^error: ${code}: .+\n$`));
    expect(err.trim().split('\n')).toHaveLength(1);
    expect(JSON.parse(out)).toMatchObject({ error: { code, reasons: expect.any(Array) } });
  });
});
