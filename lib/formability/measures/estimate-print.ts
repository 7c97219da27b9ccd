import { FILAMENTS } from '../materials/filaments';
import type { Facets } from '../mesh/measure-facets';
import { beadAreaMm2, roundedBeadAreaMm2 } from '../physics/bead';
import type { EffectiveRecipe } from '../recipe';
import type { PrintReport } from '../report';

/** Assumptions of the estimate (typical values, common practice, no source). */
export const PRINT_ASSUMPTIONS = {
  speedMmS: 60,
  /** Share of the time in which the nozzle lays material. */
  efficiency: 0.7,
  perLayerS: 2,
  filamentMm: 1.75,
};

export interface PrintInput {
  volumeMm3: number;
  heightMm: number;
  /** Area of walls, of faces that look up, and of faces that look down (bed included). */
  wallAreaMm2: number;
  topAreaMm2: number;
  bottomAreaMm2: number;
}

/**
 * Volume inside the shell: the walls' offset shrinks a section of area A and perimeter P to about A (1 − P t / 2A)²
 * (exact for a square), top and floor take their share of the height. Derived; within 0.1 % on the block of the
 * worked example, rougher on thin or branched parts.
 */
export function innerVolume(part: PrintInput, shellMm: number, topMm: number): number {
  if (part.volumeMm3 <= 0) return 0;
  const walls = 1 - (part.wallAreaMm2 * shellMm) / (2 * part.volumeMm3);
  const lids = 1 - ((part.topAreaMm2 + part.bottomAreaMm2) * topMm) / part.volumeMm3;
  return walls <= 0 || lids <= 0 ? 0 : part.volumeMm3 * walls * walls * lids;
}

/**
 * Time, material and cost: V_mat = V − (1 − ρ) V_inner; t = V_mat / (Q η) + N t_layer with Q = line × layer × speed.
 * Bead flow and infill arithmetic of common slicers; speed and efficiency are assumed. At most it takes what beads with
 * rounded ends take.
 */
export function estimatePrint(part: PrintInput, recipe: EffectiveRecipe): PrintReport {
  const { print, costs } = recipe;
  const { speedMmS, efficiency, perLayerS, filamentMm } = PRINT_ASSUMPTIONS;
  const inner = innerVolume(part, print.shellMm, print.topMm);
  const materialMm3 = Math.max(0, part.volumeMm3 - (1 - print.infillPercent / 100) * inner);
  const layers = Math.ceil(part.heightMm / print.layerMm - 1e-9);
  const layingS = materialMm3 / (speedMmS * efficiency);
  const timeS = layingS / beadAreaMm2(print.lineMm, print.layerMm) + layers * perLayerS;
  const round = roundedBeadAreaMm2(Math.max(print.lineMm, print.layerMm), print.layerMm);
  const massG = (materialMm3 / 1000) * FILAMENTS[print.material].densityGcm3.value;
  return {
    layers,
    materialMm3,
    massG,
    filamentM: materialMm3 / ((Math.PI / 4) * filamentMm ** 2) / 1000,
    timeS,
    timeMostS: Math.max(timeS, layingS / round + layers * perLayerS),
    cost: (massG / 1000) * costs.materialPerKg + (timeS / 3600) * costs.machinePerHour + costs.labour,
  };
}

/** Areas of walls, and of tops and undersides, for the print estimate. */
export function facingAreas({
  area,
  nz,
}: Facets): Pick<PrintInput, 'wallAreaMm2' | 'topAreaMm2' | 'bottomAreaMm2'> {
  let wallAreaMm2 = 0;
  let topAreaMm2 = 0;
  let bottomAreaMm2 = 0;
  for (let t = 0; t < area.length; t++) {
    wallAreaMm2 += area[t] * Math.sqrt(Math.max(0, 1 - nz[t] * nz[t]));
    if (nz[t] > 0) topAreaMm2 += area[t] * nz[t];
    else bottomAreaMm2 -= area[t] * nz[t];
  }
  return { wallAreaMm2, topAreaMm2, bottomAreaMm2 };
}
