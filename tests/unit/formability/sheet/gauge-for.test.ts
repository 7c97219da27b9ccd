import { describe, expect, it } from 'vitest';
import { formSheet } from '@/lib/formability/sheet/form-sheet';
import { betterChange, gaugeFor } from '@/lib/formability/sheet/gauge-for';
import type { SheetInput } from '@/lib/formability/sheet/sheet-input';
import { block, field } from './templates';

const input: SheetInput = {
  template: field([50, 50], block(50, 50, 18, 8)),
  frameMm: [90, 90],
  gaugeMm: 0.6,
  minFormedMm: 0.35,
};
const options = { nodes: 32 };
const thin = formSheet(input, options);
const leastOf = (formed: typeof thin) => formed.report.part!.minMm;
const thinMm = leastOf(thin);

describe('gauge for a wanted least thickness', () => {
  it('is the least in its steps that a run of its own confirms', () => {
    const wanted = 1.37 * thinMm;
    const found = gaugeFor(input, thin, wanted, options);
    expect(found.gaugeMm).toBeCloseTo(0.85, 12);
    expect(found.runs).toBe(1);
    const own = leastOf(formSheet({ ...input, gaugeMm: found.gaugeMm! }, options));
    expect(found.minMm).toBe(own);
    expect(own).toBeGreaterThanOrEqual(wanted);
    expect(leastOf(formSheet({ ...input, gaugeMm: 0.8 }, options))).toBeLessThan(wanted);
  });

  it('asks for no run where the sheet is thick enough', () => {
    const found = gaugeFor(input, thin, 0.5 * thinMm, options);
    expect(found).toMatchObject({ gaugeMm: 0.6, runs: 0, minMm: thinMm });
  });

  it('counts in that a given load presses a thicker sheet less far', () => {
    const loaded = { ...input, load: { pressureMPa: 0.05, modulusMPa: 1 } };
    const formed = formSheet(loaded, options);
    const wanted = 1.5 * leastOf(formed);
    const found = gaugeFor(loaded, formed, wanted, options);
    expect(found.minMm).toBeGreaterThanOrEqual(wanted);
    expect(found.minMm).not.toBe((found.gaugeMm! / 0.6) * leastOf(formed));
    expect(found.runs).toBeGreaterThanOrEqual(1);
  });

  it('does not pretend that a sheet four times as thick is a remedy', () => {
    const wanted = 5 * thinMm;
    const found = gaugeFor(input, thin, wanted, options);
    expect(found).toMatchObject({ gaugeMm: null, runs: 0, minMm: thinMm });
    expect(found.scaledMm).toBeCloseTo(3, 12);
  });

  it('refuses a thickness of nothing', () => {
    expect(() => gaugeFor(input, thin, 0, options)).toThrow(/give numbers above 0/);
  });
});

describe('where the template is better changed', () => {
  const { part } = thin.report;
  const formed = (belowLimitAreaMm2: number, place: (typeof thin)['minPlace'], unclosedAreaMm2 = 0) => ({
    ...thin,
    report: { ...thin.report, part: { ...part!, place, belowLimitAreaMm2 }, unclosedAreaMm2 },
  });

  it('goes by how much is thin, and by where', () => {
    expect(betterChange(formed(0.1 * part!.areaMm2, 'inner-corner'))).toBe('gauge');
    expect(betterChange(formed(20, 'inner-corner'))).toBe('radius');
    expect(betterChange(formed(20, 'pit'))).toBe('gap');
    expect(betterChange(formed(20, 'web', 40))).toBe('gap');
    expect(betterChange(formed(20, 'wall'))).toBe('height');
    expect(betterChange(formed(20, 'flat'))).toBe('gauge');
    const low = {
      ...thin,
      minPlace: 'wall' as const,
      report: { ...thin.report, part: null, belowLimitAreaMm2: 20 },
    };
    expect(betterChange(low)).toBe('height');
  });
});
