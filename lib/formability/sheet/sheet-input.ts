import { UnusableInput } from '../unusable-input';
import type { Obstacle, TemplateField } from './obstacle';

export interface SheetInput {
  /** Highest solid point over each cell, vents closed. */
  template: TemplateField;
  /** Clamp-frame opening along x and y, mm. */
  frameMm: readonly [number, number];
  /** Middle of the opening in the field's frame; left out, the middle of what stands above the bed. */
  centreMm?: readonly [number, number];
  gaugeMm: number;
  /** Least thickness wanted, mm. */
  minFormedMm: number;
  /** Forming pressure and shear modulus of the hot sheet; left out, pressed until it lies on everywhere. */
  load?: { pressureMPa: number; modulusMPa: number };
}

export interface SheetOptions {
  /** Elements along the long side of the frame, rounded to a multiple of 8. */
  nodes?: number;
  /** Fewer iterations a step: a first look. */
  preview?: boolean;
  /** No run at half the nodes: mesh errors read 0. For a run that verifies what another one found. */
  single?: boolean;
  /** Share of the work done, 0 to 1. */
  onProgress?(share: number): void;
  /** Asked at every load step; true ends the run with UnusableInput `stopped`. */
  shouldStop?(): boolean;
}

export const LEAST_NODES = 16;
export const MOST_NODES = 512;

/** Refuses what cannot be formed: says which value, why, and what to do. */
export function checkSheetInput(input: SheetInput, options: SheetOptions): void {
  const { template, frameMm, centreMm, gaugeMm, minFormedMm, load } = input;
  const reasons: string[] = [];
  const positive = (value: number, name: string) => {
    if (!(Number.isFinite(value) && value > 0)) reasons.push(`${name} is ${value}: give a number above 0`);
  };
  positive(frameMm[0], 'frame opening along x (mm)');
  positive(frameMm[1], 'frame opening along y (mm)');
  positive(gaugeMm, 'sheet gauge (mm)');
  positive(minFormedMm, 'least formed thickness (mm)');
  positive(template.cellMm, 'cell of the height field (mm)');
  if (load) {
    positive(load.pressureMPa, 'forming pressure (MPa)');
    positive(load.modulusMPa, 'shear modulus of the sheet (MPa)');
  }
  if (centreMm && !centreMm.every(Number.isFinite)) reasons.push('the middle of the frame is not a place');
  const { nodes } = options;
  if (nodes !== undefined && !(nodes >= LEAST_NODES && nodes <= MOST_NODES)) {
    reasons.push(`sheet nodes are ${nodes}: take ${LEAST_NODES} to ${MOST_NODES} along the long side`);
  }
  if (template.heights.length !== template.nx * template.ny) {
    reasons.push(
      `the height field has ${template.heights.length} heights for ${template.nx} × ${template.ny} cells`,
    );
  } else if (!template.heights.every((h) => Number.isFinite(h) && h >= 0)) {
    reasons.push('the height field has a height that is negative or no number');
  }
  if (reasons.length > 0) throw refuse(reasons);
}

/** The template must stand inside the frame, or frame and template would meet. */
export function placeFrame(input: SheetInput, { box, highest }: Obstacle): [number, number] {
  const flat = highest === 0;
  const usual: [number, number] = flat ? [0, 0] : [(box[0] + box[2]) / 2, (box[1] + box[3]) / 2];
  const centre: [number, number] = input.centreMm ? [input.centreMm[0], input.centreMm[1]] : usual;
  for (const axis of flat ? [] : [0, 1]) {
    const half = input.frameMm[axis] / 2;
    const over = Math.max(centre[axis] - half - box[axis], box[axis + 2] - centre[axis] - half);
    if (over < 0) continue;
    const name = 'xy'[axis];
    throw refuse([
      `the template reaches ${over.toFixed(2)} mm past the frame opening along ${name} (${input.frameMm[axis]} mm wide): take a larger frame or a smaller template`,
    ]);
  }
  return centre;
}

function refuse(reasons: string[]): UnusableInput {
  return new UnusableInput('invalid_recipe', `the sheet cannot be formed: ${reasons.join('; ')}`, reasons);
}
