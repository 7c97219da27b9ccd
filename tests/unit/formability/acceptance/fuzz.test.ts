import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import { UnusableInput } from '@/lib/formability/unusable-input';
import { mutatedFile } from '../../../fixtures/meshes/mutate';

/** The share of tests/bench/formability/fuzz.ts that every run can afford; STEP needs a process, so it is left to that. */
describe('mutated files of STL and 3MF (xorshift, seeded by the case: 20000 to 20119)', () => {
  it('end in a report of finite figures, or in a refusal of one line', () => {
    const ends = new Map<string, number>();
    const count = (format: string, end: string) => ends.set(`${format} ${end}`, (ends.get(`${format} ${end}`) ?? 0) + 1); // prettier-ignore
    for (let index = 20_000; index < 20_120; index++) {
      const { bytes, format } = mutatedFile(index);
      if (format.startsWith('step')) continue;
      try {
        const { report } = analyse(bytes, { grid: { cellMm: 2 } }, { geometryOnly: true });
        expect(JSON.stringify(report, (_key, value: unknown) => (typeof value === 'number' && !Number.isFinite(value) ? 'NOT-FINITE' : value)), `case ${index}`).not.toContain('NOT-FINITE'); // prettier-ignore
        count(format, 'report');
      } catch (error) {
        if (!(error instanceof UnusableInput))
          throw new Error(`case ${index}: ${String(error)}`, { cause: error });
        expect(error.message, `case ${index}`).toMatch(/^[^\n]{20,}$/);
        count(format, 'refusal');
      }
    }
    for (const format of ['stl-binary', 'stl-ascii', '3mf-text']) {
      for (const end of ['report', 'refusal']) expect(ends.get(`${format} ${end}`) ?? 0, `${format} ${end}`).toBeGreaterThan(2); // prettier-ignore
    }
  }, 180_000);
});
