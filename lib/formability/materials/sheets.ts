import { FROM_MEMORY, materialValue as v, type MaterialValue } from './value';

/** A generic sheet polymer. Temperatures °C, modulus at room temperature MPa, density kg/m³, conductivity W/mK, heat capacity J/kgK (mean to forming). */
export interface SheetMaterial {
  name: string;
  glassC: MaterialValue;
  lowerC: MaterialValue;
  formingC: MaterialValue;
  upperC: MaterialValue;
  demouldC: MaterialValue;
  shrinkPercent: MaterialValue;
  modulusMPa: MaterialValue;
  densityKgM3: MaterialValue;
  conductivityWmK: MaterialValue;
  heatJkgK: MaterialValue;
  note: string;
}

type Range = [number, number];
interface Row {
  name: string;
  glass: Range;
  lower: Range;
  core: Range;
  upper: Range;
  demould: Range;
  shrink: Range;
  e: Range;
  rho: number;
  k: number;
  c: number;
  /** Source of the forming window, where not from memory. */
  temperatures?: string;
  note?: string;
}

const CRAWFORD = 'R. J. Crawford, Plastics Engineering, 3rd ed. 1998, table 1.8 (agrees)';
const SHRINKAGE = 'two published tables of shrinkage (injection values)';
const WINDOW_TABLE = 'the usual table of forming windows, ABS row looked up';

function sheet(row: Row): SheetMaterial {
  const window = row.temperatures ?? FROM_MEMORY;
  return {
    name: row.name,
    glassC: v('°C', FROM_MEMORY, ...row.glass),
    lowerC: v('°C', window, ...row.lower),
    formingC: v('°C', window, ...row.core),
    upperC: v('°C', window, ...row.upper),
    demouldC: v('°C', window, ...row.demould),
    shrinkPercent: v('%', SHRINKAGE, ...row.shrink),
    modulusMPa: v('MPa', FROM_MEMORY, ...row.e),
    densityKgM3: v('kg/m³', CRAWFORD, row.rho),
    conductivityWmK: v('W/mK', CRAWFORD, row.k),
    heatJkgK: v('J/kgK', FROM_MEMORY, row.c),
    note: row.note ?? '',
  };
}

/**
 * Generic sheets. Forming windows are the usual handbook table (mould and set temperature, lower limit, core,
 * upper limit), from memory except the ABS row; moduli are usual datasheet ranges, from memory; density and
 * conductivity agree with R. J. Crawford, Plastics Engineering, 3rd ed. 1998, Table 1.8; shrinkage with two published
 * tables (injection values). A sheet maker's own data come first.
 */
export const SHEETS = {
  hips: sheet({ name: 'HIPS', glass: [95, 100], lower: [127, 127], core: [146, 152], upper: [182, 182], demould: [85, 85], shrink: [0.3, 0.8], e: [1600, 2400], rho: 1050, k: 0.16, c: 1900 }), // prettier-ignore
  petg: sheet({ name: 'PETG', glass: [78, 82], lower: [121, 121], core: [140, 149], upper: [166, 166], demould: [70, 77], shrink: [0.2, 0.6], e: [1700, 2100], rho: 1270, k: 0.2, c: 1750, note: 'Dry before forming or accept bubbles (common practice).' }), // prettier-ignore
  apet: sheet({ name: 'APET', glass: [73, 80], lower: [105, 120], core: [120, 150], upper: [165, 165], demould: [70, 70], shrink: [0.2, 0.5], e: [2000, 2800], rho: 1335, k: 0.24, c: 1750, note: 'Hazes when held long above about 120 to 130 °C (from memory).' }), // prettier-ignore
  pvc: sheet({ name: 'PVC, rigid', glass: [75, 85], lower: [100, 104], core: [135, 141], upper: [149, 155], demould: [60, 66], shrink: [0.2, 0.5], e: [2400, 3300], rho: 1380, k: 0.17, c: 1500, note: 'Overheated PVC gives off hydrogen chloride: local exhaust.' }), // prettier-ignore
  abs: sheet({ name: 'ABS', glass: [100, 110], lower: [127, 127], core: [149, 154], upper: [182, 182], demould: [85, 85], shrink: [0.3, 0.8], e: [1700, 2300], rho: 1050, k: 0.17, c: 2000, temperatures: WINDOW_TABLE }), // prettier-ignore
  pp: sheet({ name: 'PP', glass: [-10, -10], lower: [129, 143], core: [154, 163], upper: [166, 166], demould: [88, 88], shrink: [1, 2.5], e: [1100, 1600], rho: 905, k: 0.2, c: 2400, note: 'Narrow forming window, 8 to 15 K below melting (from memory).' }), // prettier-ignore
  pc: sheet({ name: 'PC', glass: [147, 150], lower: [168, 168], core: [188, 191], upper: [204, 204], demould: [138, 138], shrink: [0.5, 0.8], e: [2000, 2400], rho: 1200, k: 0.2, c: 1900, note: 'Dry before forming or accept bubbles (common practice).' }), // prettier-ignore
  pmma: sheet({ name: 'PMMA', glass: [100, 110], lower: [149, 149], core: [175, 177], upper: [193, 193], demould: [85, 85], shrink: [0.2, 0.8], e: [2700, 3300], rho: 1190, k: 0.19, c: 2000, note: 'Dry before forming or accept bubbles (common practice).' }), // prettier-ignore
  hdpe: sheet({ name: 'HDPE', glass: [-120, -120], lower: [127, 127], core: [138, 146], upper: [166, 182], demould: [82, 82], shrink: [1.5, 3.5], e: [700, 1200], rho: 955, k: 0.4, c: 2700 }), // prettier-ignore
  ldpe: sheet({ name: 'LDPE', glass: [-120, -120], lower: [110, 110], core: [118, 130], upper: [145, 145], demould: [60, 60], shrink: [1.5, 3.5], e: [150, 350], rho: 920, k: 0.33, c: 2700 }), // prettier-ignore
  pla: sheet({ name: 'PLA', glass: [55, 62], lower: [75, 80], core: [90, 110], upper: [125, 135], demould: [45, 50], shrink: [0.2, 0.5], e: [2300, 3500], rho: 1240, k: 0.17, c: 1800, note: 'Formed parts serve up to about 50 °C (from memory).' }), // prettier-ignore
} satisfies Record<string, SheetMaterial>;

export type SheetId = keyof typeof SHEETS;
export const SHEET_IDS = Object.keys(SHEETS) as SheetId[];
