import { FROM_MEMORY, materialValue as v, type MaterialValue } from './value';

/** A generic template material as printed. Temperatures °C, strength and modulus MPa, density g/cm³. */
export interface FilamentMaterial {
  name: string;
  glassC: MaterialValue;
  /** Heat deflection at 0.45 MPa and 1.80 MPa (ISO 75-2). */
  hdtBC: MaterialValue;
  hdtAC: MaterialValue;
  strengthXyMPa: MaterialValue;
  strengthZMPa: MaterialValue;
  modulusMPa: MaterialValue;
  densityGcm3: MaterialValue;
  conductivityWmK: MaterialValue;
  heatJkgK: MaterialValue;
  semiCrystalline: boolean;
  filled: boolean;
  note: string;
}

type Range = [low: number, high?: number, used?: number];
interface Row {
  name: string;
  glass: Range;
  hdtB: Range;
  hdtA: Range;
  xy: Range;
  z: Range;
  e: Range;
  rho: Range;
  k: Range;
  c: Range;
  /** Source of conductivity and heat capacity, where not from memory. */
  thermal?: string;
  semi?: boolean;
  filled?: boolean;
  note?: string;
}

function filament(row: Row): FilamentMaterial {
  const thermal = row.thermal ?? FROM_MEMORY;
  return {
    name: row.name,
    glassC: v('°C', FROM_MEMORY, ...row.glass),
    hdtBC: v('°C', FROM_MEMORY, ...row.hdtB),
    hdtAC: v('°C', FROM_MEMORY, ...row.hdtA),
    strengthXyMPa: v('MPa', FROM_MEMORY, ...row.xy),
    strengthZMPa: v('MPa', FROM_MEMORY, ...row.z),
    modulusMPa: v('MPa', FROM_MEMORY, ...row.e),
    densityGcm3: v('g/cm³', FROM_MEMORY, ...row.rho),
    conductivityWmK: v('W/mK', thermal, ...row.k),
    heatJkgK: v('J/kgK', thermal, ...row.c),
    semiCrystalline: row.semi ?? false,
    filled: row.filled ?? false,
    note: row.note ?? '',
  };
}

const THERMAL_TABLE = 'a published table of thermal properties of polymers';
const DRY = 'Print and use dry; stored in room air for more than a day it softens (from memory).';
const SHEDS = 'Filled grades shed fibres: seal, wear gloves, keep off the food side (common practice).';

/**
 * Generic template materials: usual datasheet ranges, from memory but for what names a source, the representative value in use.
 * A maker's data sheet or a studio's own test comes first. Values are of solid printed polymer.
 */
export const FILAMENTS = {
  pla: filament({ name: 'PLA', glass: [55, 62], hdtB: [54, 60, 56], hdtA: [49, 55, 52], xy: [45, 60], z: [20, 40], e: [2300, 3500, 2700], rho: [1.24], k: [0.13, 0.2, 0.17], c: [1200, 1800, 1600] }), // prettier-ignore
  petg: filament({ name: 'PETG', glass: [75, 82], hdtB: [68, 74, 70], hdtA: [62, 68, 65], xy: [40, 50], z: [20, 35], e: [1700, 2100, 1900], rho: [1.27], k: [0.19, 0.21], c: [1200, 1400] }), // prettier-ignore
  abs: filament({ name: 'ABS', glass: [100, 110], hdtB: [88, 98, 93], hdtA: [76, 88, 82], xy: [30, 42], z: [12, 28], e: [1700, 2300, 2000], rho: [1.04], k: [0.17, 0.25], c: [1300, 1500] }), // prettier-ignore
  asa: filament({ name: 'ASA', glass: [98, 105], hdtB: [92, 100, 97], hdtA: [80, 92, 86], xy: [35, 45], z: [18, 30], e: [1900, 2300, 2000], rho: [1.07], k: [0.17, 0.18], c: [1300, 1400] }), // prettier-ignore
  hips: filament({ name: 'HIPS', glass: [92, 100], hdtB: [82, 95, 88], hdtA: [72, 85, 78], xy: [18, 28], z: [8, 16], e: [1600, 2000, 1800], rho: [1.04], k: [0.15, 0.18], c: [1300] }), // prettier-ignore
  pa6: filament({ name: 'PA6, dry', glass: [50, 60], hdtB: [150, 185, 165], hdtA: [55, 75, 65], xy: [60, 75], z: [30, 45], e: [2000, 2800, 2400], rho: [1.13], k: [0.24, 0.28], c: [1600, 1700], thermal: THERMAL_TABLE, semi: true, note: DRY }), // prettier-ignore
  pa12: filament({ name: 'PA12', glass: [40, 50], hdtB: [110, 140, 125], hdtA: [48, 55, 50], xy: [40, 48], z: [25, 38], e: [1200, 1700, 1400], rho: [1.01], k: [0.19, 0.25], c: [1700, 2100], semi: true, note: DRY }), // prettier-ignore
  'pa12-cf': filament({ name: 'PA-CF, 15 to 20 % fibre, dry', glass: [50, 70], hdtB: [160, 200, 180], hdtA: [120, 165, 145], xy: [80, 110], z: [25, 45], e: [5000, 8500, 6500], rho: [1.15, 1.22], k: [0.3, 0.6], c: [1500], semi: true, filled: true, note: `${DRY} ${SHEDS}` }), // prettier-ignore
  pc: filament({ name: 'PC', glass: [110, 147], hdtB: [110, 142, 138], hdtA: [100, 132, 127], xy: [55, 68], z: [25, 40], e: [2000, 2400, 2200], rho: [1.2], k: [0.19, 0.22], c: [1200], thermal: THERMAL_TABLE }), // prettier-ignore
  pp: filament({ name: 'PP', glass: [-10, 0], hdtB: [75, 100, 88], hdtA: [48, 60, 54], xy: [20, 30], z: [10, 20], e: [900, 1500, 1200], rho: [0.9], k: [0.17, 0.22], c: [1700, 2000], semi: true }), // prettier-ignore
  'pet-cf': filament({ name: 'PET-CF, annealed', glass: [75, 80, 78], hdtB: [100, 205, 190], hdtA: [75, 150, 140], xy: [65, 90], z: [20, 40], e: [4500, 7000, 5500], rho: [1.29, 1.35], k: [0.25, 0.45], c: [1100, 1200], semi: true, filled: true, note: SHEDS }), // prettier-ignore
  'pps-cf': filament({ name: 'PPS-CF, annealed', glass: [88, 92], hdtB: [200, 265, 250], hdtA: [110, 230, 190], xy: [70, 100], z: [18, 35], e: [6000, 9000, 7000], rho: [1.35, 1.42], k: [0.3, 0.5], c: [1000, 1100], semi: true, filled: true, note: SHEDS }), // prettier-ignore
  'resin-ht': filament({ name: 'High-temperature resin, post-cured', glass: [120, 250], hdtB: [120, 290, 200], hdtA: [70, 240, 120], xy: [30, 80], z: [30, 80], e: [2500, 4500, 3300], rho: [1.15, 1.3], k: [0.2, 0.3], c: [1200, 1500] }), // prettier-ignore
} satisfies Record<string, FilamentMaterial>;

export type FilamentId = keyof typeof FILAMENTS;
export const FILAMENT_IDS = Object.keys(FILAMENTS) as FilamentId[];
