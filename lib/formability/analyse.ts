import { createHash } from 'node:crypto';
import { advise } from './advise';
import type { AnalyseOptions } from './analyse-options';
import type { CheckInput } from './checks/check-input';
import { runChecks } from './checks/run-checks';
import { facetFlags, facetPositions } from './facet-output';
import { fillRecipe } from './fill-recipe';
import { mapPockets } from './measures/map-pockets';
import { judgeSureness } from './judge-sureness';
import { readPullLog } from './life/pull-log';
import { judgeDraft, type DraftJudgement } from './judge-draft';
import { findOverhangs } from './measures/overhangs';
import { checkCoordinates } from './parse/check-coordinates';
import { describeSource } from './parse/describe-source';
import { readMesh } from './parse/read-mesh';
import { MM_PER_UNIT, type EffectiveRecipe, type RecipeInput } from './recipe';
import type { Analysis, AnalysisGeometry } from './report';
import { judgeSheet, type SheetJudgement } from './sheet/judge-sheet';
import { Stages } from './stages';
import { surveyPart, type Part } from './survey-part';
import { ENGINE_VERSION } from './version';
import { surveyPhysics, writePhysics } from './write-physics';
import { writeSections } from './write-sections';

/**
 * Bytes of an STL or 3MF and a recipe in, report and geometry out (`analyseFile` takes STEP too). The same input gives
 * the same bits: there is no clock, randomness or environment in here; `timings` are filled only from the clock that a
 * caller lends.
 *
 * Speed: tests/bench/formability prints it. Tried and lost, by processor time on a million facets: rays through a
 * bounding-volume tree (25 to 60 times the columns' time), a heap in the flood (twice the lists by height), a wave for
 * undercut depth (ten times the buckets), maps of strings in grouping facets (five times the arrays), 1000 cells a side
 * (a quarter more of the whole for 0.02 % of plan area).
 * @param bytes the file as it is
 * @throws UnusableInput for exit-2 cases: unusable mesh, invalid recipe, stopped by the caller
 */
export function analyse(bytes: Uint8Array, recipe: RecipeInput = {}, options: AnalyseOptions = {}): Analysis {
  const stages = new Stages(options);
  const effective = fillRecipe(recipe);
  const log = options.pullLog === undefined ? null : readPullLog(options.pullLog);
  const raw = stages.run('parse', () => {
    const parsed = options.mesh ?? readMesh(bytes);
    if (parsed.unit) effective.mesh.unit = parsed.unit;
    checkCoordinates(parsed.coords, MM_PER_UNIT[effective.mesh.unit]);
    return { ...parsed, sha256: createHash('sha256').update(bytes).digest('hex') };
  });
  const part = surveyPart(raw, effective, stages);
  effective.grid.cellMm = part.columns.grid.cell;
  const wallDraft = stages.run('draft', () => judgeDraft(part, effective));
  const geometric = stages.run('sections', () => writeSections(part, effective, wallDraft.section));
  const sheet =
    options.sheet && !options.geometryOnly
      ? stages.run('sheet', (onProgress) =>
          judgeSheet(part, effective, geometric.plan.frameMm, { onProgress, shouldStop: options.shouldStop }),
        )
      : null;
  const physics = options.geometryOnly
    ? null
    : stages.run('physics', () => {
        const known = surveyPhysics(part, geometric.plan, sheet, effective.sheet.gaugeMm, log);
        return { known, sections: writePhysics(part, effective, geometric, sheet, known) };
      });
  const sections = {
    schema: 1 as const,
    engine: ENGINE_VERSION,
    input: {
      sha256: raw.sha256,
      bytes: bytes.length,
      format: raw.format,
      unit: effective.mesh.unit,
      triangles: raw.triangles,
      ...describeSource(raw),
    },
    recipe: effective,
    ...geometric,
    ...physics?.sections,
    sureness: judgeSureness(effective, { sheetRun: Boolean(sheet?.formed), pullLog: log !== null }),
  };
  const input = checkInput(part, effective, sections, wallDraft, sheet, options.geometryOnly ?? false);
  const checks = stages.run('checks', () => runChecks(input));
  const advice = physics
    ? stages.run('advice', () => advise(part, input, checks, wallDraft.macro, physics.known))
    : [];
  const geometry = stages.run('geometry', () => ({
    ...drawGeometry(part),
    sheet: sheet?.formed?.surface ?? null,
  }));
  stages.finish();
  return { report: { ...sections, advice, checks, timings: stages.timings }, geometry };
}

function checkInput(
  part: Part,
  recipe: EffectiveRecipe,
  report: CheckInput['report'],
  wallDraft: DraftJudgement,
  sheet: SheetJudgement | null,
  geometryOnly: boolean,
): CheckInput {
  return {
    recipe,
    report,
    walls: wallDraft.walls,
    wantedDraftDeg: wallDraft.section.wantedDeg,
    overhangs: findOverhangs(part.prepared.mesh, part.facets, part.holes.bore, recipe.limits.overhangDeg),
    sheet,
    geometryOnly,
    sizeMm: part.size,
  };
}

function drawGeometry({
  prepared,
  facets,
  columns,
  holes,
  flood,
  draft,
  visibility,
  walls,
}: Part): Omit<AnalysisGeometry, 'sheet'> {
  const { mesh } = prepared;
  const { grid, height } = columns;
  const pockets = mapPockets(mesh, facets, holes.surface, flood, grid);
  return {
    positions: facetPositions(mesh),
    facetDraftDeg: draft.ofFacet,
    facetFlags: facetFlags(facets, visibility, pockets.unvented),
    facetWallMm: walls.ofFacet,
    facetSpillMm: pockets.spillMm,
    heightField: {
      cellMm: grid.cell,
      nx: grid.nx,
      ny: grid.ny,
      originX: grid.x0 + mesh.centre[0],
      originY: grid.y0 + mesh.centre[1],
      heights: Float32Array.from(height),
    },
  };
}
