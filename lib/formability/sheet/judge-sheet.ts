import type { EffectiveRecipe } from '../recipe';
import type { SheetReport, SheetZone } from '../report-sheet';
import type { Part } from '../survey-part';
import { formSheet, type FormedSheet } from './form-sheet';
import { gaugeFor, type GaugeRemedy } from './gauge-for';
import { radiusFor, type RadiusRemedy } from './radius-for';
import type { SheetInput, SheetOptions } from './sheet-input';

/** What the check of the sheet looks at. */
export interface SheetJudgement {
  /** null: not formed, and `why` says why. */
  formed: FormedSheet | null;
  why: string;
  /** Thickness that the run must show in the part so that the wanted one holds with the margin, mm. */
  neededMm: number;
  /** For the part itself; null where it is thick enough already. */
  remedy: GaugeRemedy | null;
  /** The same sheet in another gauge, by a run of its own; null where nothing was formed. */
  formAt: ((gaugeMm: number) => FormedSheet) | null;
  /** For the foot along the bed; null where that reaches the wanted thickness. */
  footRemedy: FootRemedy | null;
}

export interface FootRemedy {
  /** Gauge that lifts the foot to the wanted thickness, by proportion. */
  gaugeMm: number;
  radius: RadiusRemedy;
}

/** What the run takes; a recipe may ask for more or less. */
const [LEAST_NODES, MOST_NODES] = [16, 512];
const LEAST_WANTED_MM = 1e-3;
/** Shares of the work: the sheet itself, then the runs that verify a thicker gauge and a rounded foot. */
const FORM_SHARE = 0.5;
const GAUGE_SHARE = 0.75;

/**
 * Forms the sheet over a surveyed part, in the file's own frame, and finds the gauge that would reach the wanted
 * thickness where this one does not, and what a foot that comes out too thin would need.
 * @param frameMm opening of the clamp frame, as in the report's plan section
 * @throws UnusableInput stopped
 */
export function judgeSheet(
  part: Pick<Part, 'columns' | 'holes' | 'prepared' | 'size'>,
  recipe: EffectiveRecipe,
  frameMm: readonly [number, number],
  options: Omit<SheetOptions, 'nodes'> = {},
): SheetJudgement {
  const wantedMm = recipe.sheet.minFormedMm;
  const short = [0, 1].filter((axis) => frameMm[axis] <= part.size[axis] + 2 * part.columns.grid.cell);
  if (short.length > 0) {
    const axes = short.map((axis) => 'xy'[axis]).join(' and ');
    const why = `the frame opening (${frameMm.join(' × ')} mm) leaves no room round the template along ${axes}`;
    return { formed: null, why, neededMm: wantedMm, remedy: null, footRemedy: null, formAt: null };
  }
  const input = sheetInput(part, recipe, frameMm);
  const stage = (from: number, to: number): SheetOptions => ({
    ...options,
    nodes: Math.min(MOST_NODES, Math.max(LEAST_NODES, recipe.grid.sheetNodes)),
    onProgress: (share) => options.onProgress?.(from + share * (to - from)),
  });
  const formed = formSheet(input, stage(0, FORM_SHARE));
  const judged = judgedZone(formed.report);
  const neededMm = wantedMm / (1 - judged.marginPercent / 100);
  const remedy =
    judged.minMm >= neededMm ? null : gaugeFor(input, formed, neededMm, stage(FORM_SHARE, GAUGE_SHARE));
  const { foot } = formed.report;
  const footRemedy =
    foot && foot.minMm < wantedMm
      ? {
          gaugeMm: Math.ceil((20 * (recipe.sheet.gaugeMm * wantedMm)) / foot.minMm) / 20,
          radius: radiusFor(input, foot.minMm, wantedMm, stage(GAUGE_SHARE, 1)),
        }
      : null;
  options.onProgress?.(1);
  const { nodes } = stage(1, 1);
  const { shouldStop } = options;
  const formAt = (gaugeMm: number) => formSheet({ ...input, gaugeMm }, { nodes, shouldStop, single: true });
  return { formed, why: '', neededMm, remedy, footRemedy, formAt };
}

/** What the verdict goes by: the part; the whole sheet where the template stands no higher than a foot. */
export function judgedZone(report: SheetReport): Pick<SheetZone, 'minMm' | 'q05Mm' | 'marginPercent'> {
  return report.part ?? report;
}

/** The surveyed part as the sheet meets it: vents closed, moved back to the file's frame. */
export function sheetInput(
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
