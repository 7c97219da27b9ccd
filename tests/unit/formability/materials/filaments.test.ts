import { describe, expect, it } from 'vitest';
import { FILAMENT_IDS, FILAMENTS, type FilamentId } from '@/lib/formability/materials/filaments';
import { readTable } from './read-table';

/**
 * Usual datasheet ranges of printed materials, from memory throughout. The last columns are the representative
 * values in use where they are not the middle of the range: heat deflection, modulus, and PLA as the tool of the
 * worked heat examples (k 0.17, c 1600).
 */
const TABLE = readTable(`
  filament | glass      | hdtB    | hdtA    | xy     | z     | e         | rho       | k         | c         | used B | used A | used E
  pla      | 55 to 62   | 54–60   | 49–55   | 45–60  | 20–40 | 2300–3500 | 1.24      | 0.13–0.20 | 1200–1800 | 56     | 52     | 2700
  petg     | 75 to 82   | 68–74   | 62–68   | 40–50  | 20–35 | 1700–2100 | 1.27      | 0.19–0.21 | 1200–1400 | 70     | 65     | 1900
  abs      | 100 to 110 | 88–98   | 76–88   | 30–42  | 12–28 | 1700–2300 | 1.04      | 0.17–0.25 | 1300–1500 | 93     | 82     | 2000
  asa      | 98 to 105  | 92–100  | 80–92   | 35–45  | 18–30 | 1900–2300 | 1.07      | 0.17–0.18 | 1300–1400 | 97     | 86     | 2000
  hips     | 92 to 100  | 82–95   | 72–85   | 18–28  | 8–16  | 1600–2000 | 1.04      | 0.15–0.18 | 1300      | 88     | 78     | 1800
  pa6      | 50 to 60   | 150–185 | 55–75   | 60–75  | 30–45 | 2000–2800 | 1.13      | 0.24–0.28 | 1600–1700 | 165    | 65     | 2400
  pa12     | 40 to 50   | 110–140 | 48–55   | 40–48  | 25–38 | 1200–1700 | 1.01      | 0.19–0.25 | 1700–2100 | 125    | 50     | 1400
  pa12-cf  | 50 to 70   | 160–200 | 120–165 | 80–110 | 25–45 | 5000–8500 | 1.15–1.22 | 0.3–0.6   | 1500      | 180    | 145    | 6500
  pc       | 110 to 147 | 110–142 | 100–132 | 55–68  | 25–40 | 2000–2400 | 1.20      | 0.19–0.22 | 1200      | 138    | 127    | 2200
  pp       | -10 to 0   | 75–100  | 48–60   | 20–30  | 10–20 | 900–1500  | 0.90      | 0.17–0.22 | 1700–2000 | 88     | 54     | 1200
  pet-cf   | 75 to 80   | 100–205 | 75–150  | 65–90  | 20–40 | 4500–7000 | 1.29–1.35 | 0.25–0.45 | 1100–1200 | 190    | 140    | 5500
  pps-cf   | 88 to 92   | 200–265 | 110–230 | 70–100 | 18–35 | 6000–9000 | 1.35–1.42 | 0.3–0.5   | 1000–1100 | 250    | 190    | 7000
  resin-ht | 120 to 250 | 120–290 | 70–240  | 30–80  | 30–80 | 2500–4500 | 1.15–1.30 | 0.2–0.3   | 1200–1500 | 200    | 120    | 3300
`);
/** Representative values outside the middle that have no column of their own. */
const USED: Record<string, number> = { 'pla k': 0.17, 'pla c': 1600, 'pet-cf glass': 78 };

describe('filaments against the table', () => {
  it('has the rows of the table, no more and no fewer', () => {
    expect([...FILAMENT_IDS].sort()).toEqual(TABLE.map((row) => row.filament.text).sort());
  });

  it.each(TABLE.map((row) => [row.filament.text as FilamentId, row] as const))('%s', (id, row) => {
    const material = FILAMENTS[id];
    const written = {
      glass: material.glassC,
      hdtB: material.hdtBC,
      hdtA: material.hdtAC,
      xy: material.strengthXyMPa,
      z: material.strengthZMPa,
      e: material.modulusMPa,
      rho: material.densityGcm3,
      k: material.conductivityWmK,
      c: material.heatJkgK,
    };
    const used: Record<string, number> = {
      hdtB: row['used B'].middle,
      hdtA: row['used A'].middle,
      e: row['used E'].middle,
    };
    for (const [column, figure] of Object.entries(written)) {
      expect(figure.range ?? [figure.value, figure.value], column).toEqual(row[column].range);
      const value = used[column] ?? USED[`${id} ${column}`] ?? row[column].middle;
      expect(figure.value, column).toBeCloseTo(value, 12);
      // A published thermal table names conductivity and heat capacity of PA6 and PC; all else is from memory.
      const looked = ['pa6', 'pc'].includes(id) && ['k', 'c'].includes(column);
      expect(figure.mark, column).toBe(looked ? 'confirmed' : 'memory');
    }
  });

  it('knows what is filled with fibres and what crystallises', () => {
    const those = (key: 'filled' | 'semiCrystalline') => FILAMENT_IDS.filter((id) => FILAMENTS[id][key]);
    expect(those('filled')).toEqual(['pa12-cf', 'pet-cf', 'pps-cf']);
    expect(those('semiCrystalline')).toEqual(['pa6', 'pa12', 'pa12-cf', 'pp', 'pet-cf', 'pps-cf']);
  });
});
