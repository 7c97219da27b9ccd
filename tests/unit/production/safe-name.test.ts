import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { safeName } from '@/lib/production/pack/safe-name';

describe('a file name inside a pack', () => {
  it.each([
    ['tray b.stl', 'tray b.stl'],
    ['Törtchen.stl', 'Törtchen.stl'],
    ['../../etc/passwd', 'passwd'],
    ['C:\\parts\\tray.stl', 'tray.stl'],
    ['..', 'mesh.stl'],
    ['', 'mesh.stl'],
    ['-rf.stl', 'rf.stl'],
    ['.hidden.stl', 'hidden.stl'],
    ['a\r\nb.stl', 'a__b.stl'],
    ['recipe.json', 'mesh-recipe.json'],
    ['SHA256SUMS', 'mesh-SHA256SUMS'],
    ['con.stl', 'mesh-con.stl'],
    ['tray\u202elts.exe', 'tray_lts.exe'],
  ])('%j becomes %j', (given, expected) => expect(safeName(given)).toBe(expected));

  it('keeps its ending when it is too long', () => {
    const name = safeName(`${'ü'.repeat(300)}.stl`);
    expect(Buffer.byteLength(name)).toBeLessThanOrEqual(120);
    expect(name.endsWith('ü.stl')).toBe(true);
  });

  it('is one harmless path segment, whatever was typed (seed 7)', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 300 }), (given) => {
        const name = safeName(given);
        expect(name).toMatch(/^[^./\\\-\s][^/\\\u0000-\u001f]*$/u);
        expect(Buffer.byteLength(name)).toBeLessThanOrEqual(125);
        expect(safeName(name)).toBe(name.startsWith('mesh-') ? safeName(name) : name);
      }),
      { seed: 7, numRuns: 2_000 },
    );
  });
});
