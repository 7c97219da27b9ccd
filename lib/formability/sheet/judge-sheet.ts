import type { EffectiveRecipe } from '../recipe';
import type { Part } from '../survey-part';
import { formSheet, type FormedSheet } from './form-sheet';
import { gaugeFor, type GaugeRemedy } from './gauge-for';
import type { SheetInput, SheetOptions } from './sheet-input';

/** What the check of the sheet looks at. */
export interface SheetJudgement {
  /** null: not formed, and `why` says why. */
  formed: FormedSheet | null;
  why: string;
  /** Thickness that the run must show so that the wanted one holds with the margin, mm. */
  neededMm: number;
  /** null where the sheet is thick enough already. */
  remedy: GaugeRemedy | null;
}

/** What the run takes; a recipe may ask for more or less. */
const [LEAST_NODES, MOST_NODES] = [16, 512];
const LEAST_WANTED_MM = 1e-3;
/** Shares of the work: the sheet itself, then the run that verifies a thicker gauge. */
const FORM_SHARE = 0.5;

/**
 * Forms the sheet over a surveyed part, in the file's own frame, and finds the gauge that would reach the wanted
 * thickness where this one does not.
 * @param frameMm opening of the clamp frame, as in the report's plan section
 * @throws UnusableInput stopped
 */
export function judgeSheet(
  part: Pick<Part, 'columns' | 'holes' | 'prepared' | 'size'>,
  recipe: EffectiveRecipe,
  frameMm: readonly [number, number],
  options: Omit<SheetOptions, 'nodes'> = {},
): SheetJudgement {
  const short = [0, 1].filter((axis) => frameMm[axis] <= part.size[axis] + 2 * part.columns.grid.cell);
  if (short.length > 0) {
    const axes = short.map((axis) => 'xy'[axis]).join(' and ');
    const why = `the frame opening (${frameMm.join(' × ')} mm) leaves no room round the template along ${axes}`;
    return { formed: null, why, neededMm: recipe.sheet.minFormedMm, remedy: null };
  }
  const input = sheetInput(part, recipe, frameMm);
  const stage = (from: number, to: number): SheetOptions => ({
    ...options,
    nodes: Math.min(MOST_NODES, Math.max(LEAST_NODES, recipe.grid.sheetNodes)),
    onProgress: (share) => options.onProgress?.(from + share * (to - from)),
  });
  const formed = formSheet(input, stage(0, FORM_SHARE));
  const neededMm = recipe.sheet.minFormedMm / (1 - formed.report.marginPercent / 100);
  const enough = formed.report.minMm >= neededMm;
  const remedy = enough ? null : gaugeFor(input, formed, neededMm, stage(FORM_SHARE, 1));
  options.onProgress?.(1);
  return { formed, why: '', neededMm, remedy };
}

/** The surveyed part as the sheet meets it: vents closed, moved back to the file's frame. */
function sheetInput(
  { columns, holes, prepared }: Pick<Part, 'columns' | 'holes' | 'prepared'>,
  { sheet }: EffectiveRecipe,
  frameMm: readonly [number, number],
): SheetInput {
  const { grid } = columns;
  const { centre } = prepared.mesh;
  return {
    template: {
      cellMm: grid.cell,
      nx: grid.nx,
      ny: grid.ny,
      originX: grid.x0 + centre[0],
      originY: grid.y0 + centre[1],
      heights: holes.surface,
    },
    frameMm,
    centreMm: centre,
    gaugeMm: sheet.gaugeMm,
    // 0 asks for nothing.
    minFormedMm: Math.max(sheet.minFormedMm, LEAST_WANTED_MM),
  };
}
