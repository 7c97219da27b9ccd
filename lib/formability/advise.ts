import type { CheckInput } from './checks/check-input';
import { runChecks } from './checks/run-checks';
import { candidateChanges } from './candidate-changes';
import { fillRecipe } from './fill-recipe';
import { judgeDraft } from './judge-draft';
import { estimatePrint, facingAreas } from './measures/estimate-print';
import { measureLayers } from './measures/measure-layers';
import type { MacroWalls } from './measures/measure-macro-draft';
import type { EffectiveRecipe, RecipeInput } from './recipe';
import { recipeSchema } from './recipe-schema';
import type { Advice, Check, CheckId, CheckStatus } from './report';
import { judgedZone } from './sheet/judge-sheet';
import { scaleSheet } from './sheet/scale-sheet';
import type { Part } from './survey-part';
import { writePhysics, type KnownPhysics } from './write-physics';

const MOST_ADVICE = 3;
/** Share of the scaled thickness that the run of a gauge must show. */
const AS_SCALED = 0.99;
const WEIGHT: Record<CheckStatus, number> = { fail: 3, caution: 1, pass: 0, 'not-run': 0 };

/**
 * The changes of the recipe that buy most: each is tried by running all checks on the changed recipe, on the same mesh.
 * Ranked by what they mend, then by what they cost in print time. Those that make anything worse are left out.
 */
export function advise(
  part: Part,
  input: CheckInput,
  checks: Check[],
  macro: MacroWalls,
  physics: KnownPhysics,
): Advice[] {
  const before = new Map(checks.map((check) => [check.id, check.status]));
  const weight = total(checks);
  if (weight === 0) return [];
  const facing = facingAreas(part.facets);
  const { remedy, footRemedy } = input.sheet ?? {};
  const provenMm = remedy?.gaugeMm ?? footRemedy?.gaugeMm;
  const tried = candidateChanges(input.recipe, input.report, before, provenMm).flatMap(({ change, text }) => {
    const recipe = withChange(input.recipe, change);
    if (!recipe) return [];
    const changed = judgeAgain(part, input, recipe, { macro, facing, physics });
    const worse = changed.checks.some(
      (check) => WEIGHT[check.status] > WEIGHT[before.get(check.id) ?? 'pass'],
    );
    const mends = changed.checks
      .filter((check) => WEIGHT[check.status] < WEIGHT[before.get(check.id) ?? 'pass'])
      .map((check): CheckId => check.id);
    if (worse || mends.length === 0) return [];
    const { print } = input.report;
    return [
      {
        gain: weight - total(changed.checks),
        advice: {
          change,
          mends,
          costS: changed.report.print.timeS - print.timeS,
          costG: changed.report.print.massG - print.massG,
          text,
        },
      },
    ];
  });
  tried.sort(
    (a, b) => b.gain - a.gain || a.advice.costS - b.advice.costS || (a.advice.text < b.advice.text ? -1 : 1),
  );
  // One of each kind: three materials would say one thing thrice.
  const kinds = new Set<string>();
  const best = tried.filter(({ advice }) => {
    const kind = kindOf(advice.change);
    return kinds.has(kind) ? false : kinds.add(kind);
  });
  const proven = best.slice(0, MOST_ADVICE + 1).filter(({ advice }) => formsAsScaled(input, advice));
  return proven.slice(0, MOST_ADVICE).map(({ advice }) => advice);
}

/** A gauge that mends the sheet was scaled; the best one is proven by a run, unless the check's own remedy was. */
function formsAsScaled({ sheet, recipe }: CheckInput, { change, mends }: Advice): boolean {
  const gaugeMm = change.sheet?.gaugeMm;
  if (!gaugeMm || !sheet?.formAt || !mends.includes('sheet') || gaugeMm === sheet.remedy?.gaugeMm)
    return true;
  const scaled = scaleSheet(sheet, gaugeMm / recipe.sheet.gaugeMm).formed!.report;
  return judgedZone(sheet.formAt(gaugeMm).report).minMm >= AS_SCALED * judgedZone(scaled).minMm;
}

function kindOf(change: RecipeInput): string {
  return Object.entries(change)
    .flatMap(([part, fields]) => Object.keys(fields as object).map((field) => `${part}.${field}`))
    .sort()[0];
}

function total(checks: Check[]): number {
  return checks.reduce((sum, check) => sum + WEIGHT[check.status], 0);
}

/** All checks on the same mesh with a changed recipe; only what hangs on the change is reckoned anew. */
function judgeAgain(
  part: Part,
  input: CheckInput,
  recipe: EffectiveRecipe,
  known: { macro: MacroWalls; facing: ReturnType<typeof facingAreas>; physics: KnownPhysics },
): { checks: Check[]; report: CheckInput['report'] } {
  const { print, limits } = recipe;
  const layered = print.layerMm !== input.recipe.print.layerMm;
  const redrawn = layered || print.sanded !== input.recipe.print.sanded;
  const draft = redrawn ? judgeDraft(part, recipe, known.macro) : null;
  const report = {
    ...input.report,
    recipe,
    ...(layered ? { layers: measureLayers(part.facets, print.layerMm, limits.layerGrooveMm) } : {}),
    ...(draft ? { draft: { ...input.report.draft, ...draft.section } } : {}),
    print: estimatePrint(
      {
        volumeMm3: input.report.mesh.unionVolumeMm3,
        heightMm: part.size[2],
        ...known.facing,
      },
      recipe,
    ),
  };
  const whole = {
    ...report,
    ...writePhysics(part, recipe, report, input.sheet, known.physics, input.report.air),
  };
  return {
    report: whole,
    checks: runChecks({
      ...input,
      sheet: input.sheet && scaleSheet(input.sheet, recipe.sheet.gaugeMm / input.recipe.sheet.gaugeMm),
      recipe,
      report: whole,
      walls: draft?.walls ?? input.walls,
      wantedDraftDeg: draft?.section.wantedDeg ?? input.wantedDraftDeg,
    }),
  };
}

/** The recipe with a change, its line width following the nozzle; null where no recipe may say that. */
function withChange(recipe: EffectiveRecipe, change: RecipeInput): EffectiveRecipe | null {
  const follows = change.print?.nozzleMm === undefined ? {} : { lineMm: null };
  const { grid, ...rest } = recipe;
  const changed = {
    ...rest,
    print: { ...recipe.print, ...change.print, ...follows },
    sheet: { ...recipe.sheet, ...change.sheet },
    run: { ...recipe.run, ...change.run },
  };
  if (!recipeSchema.safeParse(changed).success) return null;
  // The grid is the one that the part was measured on, finer than a recipe may ask for where the part is tiny.
  return { ...fillRecipe(changed), grid };
}
