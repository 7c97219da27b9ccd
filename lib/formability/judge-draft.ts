import { wantedDraft } from './checks/check-draft';
import { judgeWalls, wallRegions, type WallJudgement } from './measures/judge-walls';
import { macroRegions, measureMacroDraft, type MacroWalls } from './measures/measure-macro-draft';
import { nubDraftDeg } from './physics/layer-surface';
import type { EffectiveRecipe } from './recipe';
import type { DraftReport } from './report';
import type { Part } from './survey-part';

const MOST_REGIONS = 24;
const LEAST_AREA_MM2 = 1;
/** A ceiling that faces down more than this is no wall at any scale. */
const NZ_CEILING = -Math.sin(Math.PI / 4);

export interface DraftJudgement {
  walls: WallJudgement;
  /** The walls at scales above 1 mm, which no recipe changes. */
  macro: MacroWalls;
  section: Pick<DraftReport, 'wallMinMacroDeg' | 'wantedDeg' | 'regions'>;
}

/**
 * The walls' draft facet by facet and at scales above 1 mm, held to what the recipe's print needs.
 * @param known the walls as measured before, for another recipe on the same part
 */
export function judgeDraft(
  part: Part,
  { print, limits }: EffectiveRecipe,
  known?: MacroWalls,
): DraftJudgement {
  const { prepared, facets, draft, wallFacets, size } = part;
  const { mesh } = prepared;
  const wantedDeg = wantedDraft({
    sanded: print.sanded,
    minDeg: limits.draftMinDeg,
    failDeg: limits.draftFailDeg,
    layerDraftDeg: nubDraftDeg(print.layerMm, limits.layerGrooveMm),
  });
  const macro = known ?? measureMacroDraft(mesh, facets, notWalls(part), Math.max(...size));
  const walls = judgeWalls(mesh, facets, draft.ofFacet, wallFacets, wantedDeg);
  const regions = walls.stepped
    ? macroRegions(macro, wantedDeg, LEAST_AREA_MM2, MOST_REGIONS)
    : wallRegions(mesh, facets, draft.ofFacet, wallFacets, walls, wantedDeg);
  const [x, y] = mesh.centre;
  return {
    walls,
    macro,
    section: {
      wallMinMacroDeg: macro.minDeg,
      wantedDeg,
      // Facet groups already lie in the file's frame.
      regions: walls.stepped
        ? regions.map(({ at, ...rest }) => ({ ...rest, at: [at[0] + x, at[1] + y, at[2]] }))
        : regions,
    },
  };
}

/** Facets that are no wall to the sheet: bed, bores, flat ceilings of undercuts, cavities, what lies inside solid. */
function notWalls({ facets, holes, undercuts, visibility }: Part): Uint8Array {
  const { bed, nz } = facets;
  const { bore } = holes;
  const { ceiling } = undercuts;
  const { touched } = visibility;
  const skip = new Uint8Array(bed.length);
  for (let t = 0; t < skip.length; t++) {
    if (touched[t] === 0 || bed[t] || bore[t] || (ceiling[t] && nz[t] < NZ_CEILING)) skip[t] = 1;
  }
  return skip;
}
