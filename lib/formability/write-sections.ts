import type { CheckInput } from './checks/check-input';
import { describeMesh } from './describe-mesh';
import { undercutAreas } from './facet-output';
import type { DraftJudgement } from './judge-draft';
import { estimatePrint, facingAreas } from './measures/estimate-print';
import { measureEdges } from './measures/measure-edges';
import { measureLayers } from './measures/measure-layers';
import { measurePlan } from './measures/measure-plan';
import { measureShadow } from './measures/measure-shadow';
import type { EffectiveRecipe } from './recipe';
import type { Point, Report } from './report';
import type { Part } from './survey-part';

type Sections = Omit<CheckInput['report'], 'schema' | 'engine' | 'input' | 'recipe' | 'sureness'>;

/** The report's sections, with places in the file's own frame in x and y. */
export function writeSections(
  part: Part,
  recipe: EffectiveRecipe,
  wallDraft: DraftJudgement['section'],
): Sections {
  const { prepared, facets, columns, air, undercuts, holes, visibility, draft, size } = part;
  const { mesh, edges } = prepared;
  const { machine, print, limits } = recipe;
  const here = (at: Point): Point => [at[0] + mesh.centre[0], at[1] + mesh.centre[1], at[2]];
  const meshReport = describeMesh(prepared, facets, columns, recipe.mesh, air.undercutVolume);
  const shadow = measureShadow({
    mesh,
    facets,
    columns,
    air,
    visibility,
    unionVolumeMm3: meshReport.unionVolumeMm3,
    sound: columns.openColumns + columns.overlapColumns === 0 && prepared.min[2] >= 0,
    unseenMm3: undercuts.unseenMm3,
  });
  const regions = undercuts.regions.map((region) => ({ ...region, at: here(region.at) }));
  const found = measureEdges(
    mesh,
    facets,
    edges,
    visibility,
    holes.bore,
    limits.edgeRadiusGauges * recipe.sheet.gaugeMm,
  );
  const walls = part.walls.report;
  const { detail } = part;
  const margin = 2 * machine.frameMarginMm;
  return {
    mesh: meshReport,
    draft: { ...draft.draft, ...wallDraft },
    plan: measurePlan({
      mesh,
      facets,
      edges,
      columns,
      visibility,
      bore: holes.bore,
      boreAreaMm2: holes.boreAreaMm2,
      surface: holes.surface,
      frameMm: machine.frameMm ?? [size[0] + margin, size[1] + margin],
      heightMm: size[2],
      watertight: meshReport.watertight,
    }),
    undercut: {
      ...undercutAreas(facets, visibility, holes.bore),
      undercutVolumeMm3: shadow.undercut,
      enclosedVolumeMm3: shadow.enclosed,
      shadowVolumeMm3: shadow.undercut + shadow.enclosed,
      maxDepthMm: regions.length > 0 ? regions[0].maxDepthMm : 0,
      regions,
    },
    airTraps: part.traps.map((trap) => ({ ...trap, floor: here(trap.floor) })),
    vents: holes.vents.map((vent) => ({ ...vent, at: here(vent.at) })),
    spacing: part.spacing.map((pair) => ({
      ...pair,
      between: [here(pair.between[0]), here(pair.between[1])],
    })),
    walls: { ...walls, minAt: walls.minAt && here(walls.minAt) },
    detail: {
      ...detail,
      smallestFeatureAt: detail.smallestFeatureAt && here(detail.smallestFeatureAt),
      smallestGapAt: detail.smallestGapAt && here(detail.smallestGapAt),
    },
    edges: { ...found, places: found.places.map((place) => ({ ...place, at: here(place.at) })) },
    layers: measureLayers(facets, print.layerMm, limits.layerGrooveMm),
    print: estimatePrint(
      { volumeMm3: meshReport.unionVolumeMm3, heightMm: size[2], ...facingAreas(facets) },
      recipe,
    ),
    ...NOT_COMPUTED,
  };
}

/** Sections whose physics this version has not: the checks say why. */
const NOT_COMPUTED: Pick<
  Report,
  'sheet' | 'air' | 'ventMarks' | 'heat' | 'skin' | 'wallsUnderPressure' | 'web' | 'thinning' | 'life'
> = {
  sheet: null,
  air: [],
  ventMarks: [],
  heat: null,
  skin: null,
  wallsUnderPressure: null,
  web: null,
  thinning: null,
  life: null,
};
