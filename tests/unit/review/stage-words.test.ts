import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import { stageName } from '@/lib/review/check-words';
import { frustum } from '../../fixtures/meshes/solids';
import { binaryStl } from '../../fixtures/meshes/write-stl';

describe('what a check run is doing, in words', () => {
  it('is said for every stage of the engine, and for those of the worker', () => {
    const stages = new Set<string>();
    analyse(binaryStl(frustum(60, 40, 15, 8)), { grid: { cellMm: 1, sheetNodes: 16 } }, {
      sheet: true,
      onProgress: (stage) => stages.add(stage),
    }); // prettier-ignore
    stages.delete('done');
    expect(stages.size).toBeGreaterThan(12);
    for (const stage of [...stages, 'reading', 'model', 'picture'])
      expect(stageName(stage), stage).not.toBe(stage);
    expect(stageName('sheet')).toBe('Forming the sheet');
  });

  it('is the stage’s own name where it is newer than the words', () => {
    expect(stageName('weighing')).toBe('weighing');
  });
});
