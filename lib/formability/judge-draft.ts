import { wantedDraft } from './checks/check-draft';
import { judgeWalls, type WallJudgement } from './measures/judge-walls';
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
  const { prepared, facets, draft, visibility, holes, size } = part;
  const { mesh } = prepared;
  const wantedDeg = wantedDraft({
    sanded: print.sanded,
    minDeg: limits.draftMinDeg,
    failDeg: limits.draftFailDeg,
    layerDraftDeg: nubDraftDeg(print.layerMm, limits.layerGrooveMm),
  });
  const macro = known ?? measureMacroDraft(mesh, facets, notWalls(part), Math.max(...size));
  const walls = judgeWalls(mesh, facets, draft.ofFacet, visibility, holes.bore, wantedDeg);
  const regions = walls.stepped
    ? macroRegions(macro, wantedDeg, LEAST_AREA_MM2, MOST_REGIONS)
    : walls.regions;
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
  const skip = facets.bed.slice();
  for (let t = 0; t < skip.length; t++) {
    const ceiling = undercuts.ceiling[t] && facets.nz[t] < NZ_CEILING;
    if (holes.bore[t] || ceiling || visibility.visible[t] + visibility.shadowed[t] < 0.5) skip[t] = 1;
  }
  return skip;
}
