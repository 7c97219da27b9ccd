import { describe, expect, it } from 'vitest';
import { stageLimits } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/stage-limits';

const recipe = {
  print: { layerMm: 0.12, sanded: false },
  limits: { draftMinDeg: 6, cuspMaxMm: 0.08, shellMinMm: 4 },
};

describe('limits that the maps are held against', () => {
  it('are those that the checks used', () => {
    const findings = [
      { checkId: 'shell', limit: 0.9 },
      { checkId: 'draft', limit: 9.462 },
      { checkId: 'layers', limit: 0.2 },
    ];
    expect(stageLimits(findings, recipe)).toEqual({
      draftDeg: 9.46,
      layerMm: 0.12,
      stepMm: 0.08,
      wallMm: 0.9,
      sheetMm: null,
    });
  });

  it('are the recipe’s own before a check has run, and common practice where it names none', () => {
    expect(stageLimits([], recipe)).toEqual({
      draftDeg: 6,
      layerMm: 0.12,
      stepMm: 0.08,
      wallMm: 4,
      sheetMm: null,
    });
    expect(stageLimits([], {})).toEqual({
      draftDeg: 5,
      layerMm: null,
      stepMm: 0.1,
      wallMm: 3,
      sheetMm: null,
    });
    expect(stageLimits([{ checkId: 'shell', limit: null }], {}).wallMm).toBe(3);
  });

  it('take the thickness that the recipe wants of the formed sheet, and none where it wants none', () => {
    expect(stageLimits([], { ...recipe, sheet: { minFormedMm: 0.25 } }).sheetMm).toBe(0.25);
    expect(stageLimits([], { ...recipe, sheet: { minFormedMm: 0 } }).sheetMm).toBeNull();
  });

  it('leave steps alone on a template that is sanded', () => {
    expect(stageLimits([], { ...recipe, print: { layerMm: 0.2, sanded: true } })).toMatchObject({
      layerMm: 0.2,
      stepMm: null,
    });
  });
});
