import type { WallJudgement } from '../measures/judge-walls';
import type { EffectiveRecipe } from '../recipe';
import type { Place, Report } from '../report';
import type { SheetJudgement } from '../sheet/judge-sheet';

/** What a check may look at: the report's sections, and a few judgements that only checks need. */
export interface CheckInput {
  recipe: EffectiveRecipe;
  report: Omit<Report, 'checks' | 'timings' | 'advice'>;
  walls: WallJudgement;
  /** Draft that these walls need, and how it is made up. */
  wantedDraftDeg: number;
  /** Faces steeper from vertical than the printer bridges, cavities included. */
  overhangs: { areaMm2: number; worstDeg: number; places: Place[] };
  /** Null where the sheet was not asked for. */
  sheet: SheetJudgement | null;
  geometryOnly: boolean;
  sizeMm: [number, number, number];
}
