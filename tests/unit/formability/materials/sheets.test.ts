import { describe, expect, it } from 'vitest';
import { SHEET_IDS, SHEETS, type SheetId } from '@/lib/formability/materials/sheets';
import { effusivity } from '@/lib/formability/physics/conduction';
import { readTable } from './read-table';

/**
 * The usual handbook table of forming windows, from memory but for the row of ABS, with density and conductivity as
 * in R. J. Crawford, Plastics Engineering, 3rd ed. 1998, Table 1.8 and shrinkage as in two published tables.
 * Modulus at room temperature is the usual datasheet range, from memory. Effusivity is worked out apart: √(kρc).
 */
const TABLE = readTable(`
  sheet | glass      | lower   | core    | upper   | demould | shrink  | modulus   | rho  | k    | c    | effusivity
  hips  | 95 to 100  | 127     | 146–152 | 182     | 85      | 0.3–0.8 | 1600–2400 | 1050 | 0.16 | 1900 | 565.0
  petg  | 78 to 82   | 121     | 140–149 | 166     | 70–77   | 0.2–0.6 | 1700–2100 | 1270 | 0.20 | 1750 | 666.7
  apet  | 73 to 80   | 105–120 | 120–150 | 165     | 70      | 0.2–0.5 | 2000–2800 | 1335 | 0.24 | 1750 | 748.8
  pvc   | 75 to 85   | 100–104 | 135–141 | 149–155 | 60–66   | 0.2–0.5 | 2400–3300 | 1380 | 0.17 | 1500 | 593.2
  abs   | 100 to 110 | 127     | 149–154 | 182     | 85      | 0.3–0.8 | 1700–2300 | 1050 | 0.17 | 2000 | 597.5
  pp    | -10        | 129–143 | 154–163 | 166     | 88      | 1.0–2.5 | 1100–1600 | 905  | 0.20 | 2400 | 659.1
  pc    | 147 to 150 | 168     | 188–191 | 204     | 138     | 0.5–0.8 | 2000–2400 | 1200 | 0.20 | 1900 | 675.3
  pmma  | 100 to 110 | 149     | 175–177 | 193     | 85      | 0.2–0.8 | 2700–3300 | 1190 | 0.19 | 2000 | 672.5
  hdpe  | -120       | 127     | 138–146 | 166–182 | 82      | 1.5–3.5 | 700–1200  | 955  | 0.40 | 2700 | 1015.6
  ldpe  | -120       | 110     | 118–130 | 145     | 60      | 1.5–3.5 | 150–350   | 920  | 0.33 | 2700 | 905.4
  pla   | 55 to 62   | 75–80   | 90–110  | 125–135 | 45–50   | 0.2–0.5 | 2300–3500 | 1240 | 0.17 | 1800 | 616.0
`);

describe('sheets against the table', () => {
  it('has the rows of the table, no more and no fewer', () => {
    expect([...SHEET_IDS].sort()).toEqual(TABLE.map((row) => row.sheet.text).sort());
  });

  it.each(TABLE.map((row) => [row.sheet.text as SheetId, row] as const))('%s', (id, row) => {
    const sheet = SHEETS[id];
    const written = {
      glass: sheet.glassC,
      lower: sheet.lowerC,
      core: sheet.formingC,
      upper: sheet.upperC,
      demould: sheet.demouldC,
      shrink: sheet.shrinkPercent,
      modulus: sheet.modulusMPa,
      rho: sheet.densityKgM3,
      k: sheet.conductivityWmK,
      c: sheet.heatJkgK,
    };
    for (const [column, figure] of Object.entries(written)) {
      expect(figure.range ?? [figure.value, figure.value], column).toEqual(row[column].range);
      expect(figure.value, `${column}: the middle is used`).toBeCloseTo(row[column].middle, 12);
    }
    const [conductivityWmK, densityKgM3, heatJkgK] = [written.k.value, written.rho.value, written.c.value];
    expect(effusivity({ conductivityWmK, densityKgM3, heatJkgK })).toBeCloseTo(row.effusivity.middle, 1);
  });

  it('marks the window of ABS confirmed and the others as from memory; shrinkage and density confirmed', () => {
    for (const [id, sheet] of Object.entries(SHEETS)) {
      const mark = id === 'abs' ? 'confirmed' : 'memory';
      for (const figure of [sheet.lowerC, sheet.formingC, sheet.upperC, sheet.demouldC])
        expect(figure.mark, id).toBe(mark);
      expect([sheet.glassC, sheet.modulusMPa, sheet.heatJkgK].map((figure) => figure.mark), id).toEqual(['memory', 'memory', 'memory']); // prettier-ignore
      const confirmed = [sheet.shrinkPercent, sheet.densityKgM3, sheet.conductivityWmK];
      expect(new Set(confirmed.map((figure) => figure.mark)), id).toEqual(new Set(['confirmed']));
    }
  });
});
