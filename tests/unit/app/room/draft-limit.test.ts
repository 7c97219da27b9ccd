import { describe, expect, it } from 'vitest';
import { fillRecipe } from '@/lib/formability/fill-recipe';
import { draftLimit } from '@/app/w/[workspace]/templates/[template]/[letter]/_components/draft-limit';

const recipe = { ...fillRecipe({}), limits: { ...fillRecipe({}).limits, draftMinDeg: 6 } };

describe('the draft that model and section are marked by', () => {
  it('is the limit of the draft check, layers included', () => {
    const findings = [
      { checkId: 'undercut', limit: 0.2 },
      { checkId: 'draft', limit: 6.812_34 },
    ];
    expect(draftLimit(findings, recipe)).toBe(6.81);
    expect(draftLimit([{ checkId: 'draft', limit: 5 }], recipe)).toBe(5);
  });

  it('is the recipe’s before the check has run, and the practice limit where it names none', () => {
    expect(draftLimit([], recipe)).toBe(6);
    expect(draftLimit([{ checkId: 'draft', limit: null }], recipe)).toBe(6);
    expect(draftLimit([], {})).toBe(5);
  });
});
