import { describe, expect, it } from 'vitest';
import { sayGive } from '@/lib/formability/checks/basis';
import { checkMesh } from '@/lib/formability/checks/check-mesh';
import { checkPrint } from '@/lib/formability/checks/check-print';
import { withWeb } from '@/lib/formability/checks/say-web';
import { checkWith } from './check-with';
import { at, many } from './made-places';

describe('mesh and print', () => {
  it('names the first 24 places', () => {
    const check = checkWith(checkMesh, ({ report }) => {
      report.mesh.warnings = ['nonmanifold_edge'];
      report.mesh.places = many(30, (k) => ({ code: 'nonmanifold_edge', at: at(k), count: 1, sizeMm: 1 }));
    });
    expect(check.places).toHaveLength(24);
  });

  it('a body hangs in the air from 0.0001 mm above the bed', () => {
    const hanging = (z: number) =>
      checkWith(checkMesh, ({ report }) => {
        report.mesh.warnings = ['floating'];
        report.mesh.repairs = ['dropped_to_bed'];
        report.mesh.places = [{ code: 'floating', at: [0, 0, z], count: 1, sizeMm: 1 }];
      }).status;
    expect([hanging(0.995e-4), hanging(1.005e-4)]).toEqual(['pass', 'fail']);
  });

  it('print says hours, and what it assumes', () => {
    const check = checkWith(checkPrint, ({ report }) => (report.print.timeS = 36_000));
    expect(check.message).toMatch(/about 10 h\b/);
    expect(checkWith(checkPrint, ({ report }) => (report.print.timeS = 360_000)).message).toMatch(
      /about 100 h\b/,
    );
    const short = checkWith(checkPrint, ({ report }) =>
      Object.assign(report.print, { timeS: 90, massG: 0.18 }),
    );
    expect(short.message).toMatch(/about 2 min, .* 0\.18 g or/);
    expect(check.basis.source).toContain('60 mm/s at 70 % efficiency and 2 s a layer');
  });
});

it('a ring of sheet folds from half a percent of its length that is too much', () => {
  const ring = { perimeterMm: 1, gapMm: 1, heightMm: 1, ringMm: 1, meridianStretch: 1, gapThatHoldsMm: null };
  const found = (tooMuch: number) => ({ ...ring, webs: tooMuch > 0, limit: 0.9, hoopStretch: 0.9 - tooMuch });
  const outside = (tooMuch: number) => withWeb('Apart.', { outside: found(tooMuch), neighbours: null });
  expect([0.00495, -0.1].map(outside)).toEqual(['Apart.', 'Apart.']);
  expect(outside(0.00505)).toContain('may fold at the corners');
});

it('deflections are said from 0.001 to 5 mm', () => {
  expect([5.01, 4.99, 0.001005, 0.000995].map(sayGive)).toEqual([
    'more than 5',
    '4.99',
    '0.001',
    'less than 0.001',
  ]);
});
