import { createHash } from 'node:crypto';
import type { AnalyseOptions } from './analyse-options';
import { wantedDraft } from './checks/check-draft';
import type { CheckInput } from './checks/check-input';
import { runChecks } from './checks/run-checks';
import { connectAir } from './dexel/air';
import { affordGrid } from './dexel/afford-grid';
import { buildColumns } from './dexel/columns';
import { makeGrid } from './dexel/grid';
import { rasterise } from './dexel/raster';
import { facetFlags, facetPositions, undercutAreas } from './facet-output';
import { fillRecipe } from './fill-recipe';
import { judgeWalls } from './measures/judge-walls';
import { estimatePrint } from './measures/estimate-print';
import { findAirTraps } from './measures/find-air-traps';
import { findSpacing } from './measures/find-spacing';
import { findUndercuts } from './measures/find-undercuts';
import { findVents } from './measures/find-vents';
import { measureDraft } from './measures/measure-draft';
import { measureEdges } from './measures/measure-edges';
import { measureLayers } from './measures/measure-layers';
import { measureMacroDraft } from './measures/measure-macro-draft';
import { measurePlan } from './measures/measure-plan';
import { measureWalls } from './measures/measure-walls';
import { findOverhangs } from './measures/overhangs';
import { refineDepth } from './measures/refine-depth';
import { findVisibility } from './measures/visibility';
import { measureFacets } from './mesh/measure-facets';
import { prepareMesh } from './mesh/prepare-mesh';
import { checkCoordinates } from './parse/check-coordinates';
import { readMesh } from './parse/read-mesh';
import { MM_PER_UNIT, type RecipeInput } from './recipe';
import { describeMesh } from './describe-mesh';
import type { Analysis, Point, Report } from './report';
import { Stages } from './stages';
import { ENGINE_VERSION } from './version';

/**
 * Bytes of an STL and a recipe in, report and geometry out. The same input gives the same bits: there is no clock,
 * randomness or environment in here; `timings` are filled only from the clock that a caller lends.
 *
 * Speed, one million facets on one core: see tests/bench/formability. Lost against what is here: rays through a
 * bounding-volume tree (about 20 times slower, and double hits on shared edges), DataView-free aligned copies
 * (twice the parse time), welding through a Map of strings (10 times), a grid of 1024² for small parts only.
 * @param bytes the file as it is
 * @throws UnusableInput for exit-2 cases: unusable mesh, invalid recipe, stopped by the caller
 */
export function analyse(bytes: Uint8Array, recipe: RecipeInput = {}, options: AnalyseOptions = {}): Analysis {
  const stages = new Stages(options);
  const effective = fillRecipe(recipe);
  const mmPerUnit = MM_PER_UNIT[effective.mesh.unit];

  const raw = stages.run('parse', () => {
    const parsed = readMesh(bytes);
    checkCoordinates(parsed.coords, mmPerUnit);
    return { ...parsed, sha256: createHash('sha256').update(bytes).digest('hex') };
  });
  const prepared = stages.run('mesh', () => prepareMesh(raw, { mmPerUnit, ...effective.mesh }));
  const { mesh, shells, edges, min, max } = prepared;
  const facets = measureFacets(mesh);
  const size: Point = [max[0] - min[0], max[1] - min[1], Math.max(0, max[2])];

  const { columns, perFacet } = stages.run('columns', () => {
    const low = [min[0] - mesh.centre[0], min[1] - mesh.centre[1]];
    const high = [max[0] - mesh.centre[0], max[1] - mesh.centre[1]];
    const grid = affordGrid(mesh, makeGrid(low, high, effective.grid.cellMm));
    const hits = rasterise(mesh, grid, edges.boundary > 0 || edges.nonManifold > 0 ? 2 : 0);
    return { columns: buildColumns(hits, grid, shells.ofFacet), perFacet: hits.perFacet };
  });
  const { grid } = columns;
  effective.grid.cellMm = grid.cell;

  const air = stages.run('air', () => connectAir(columns));
  const { regions, ceiling } = stages.run('undercut', () => {
    const found = findUndercuts(columns, air, effective.limits.undercutDepthMm, mesh.triangles);
    refineDepth(mesh, found.regions, grid.cell, shells.ofFacet);
    return found;
  });
  const holes = stages.run('vents', () =>
    findVents(mesh, facets, edges, columns, shells.ofFacet, effective.print.holeModel),
  );
  const traps = stages.run('pits', () => findAirTraps(holes.surface, grid, holes.vents));
  const spacing = findSpacing(holes.surface, grid, size[2]);
  const visibility = findVisibility(mesh, facets, columns, air, perFacet);
  const { draft, ofFacet: draftOfFacet } = measureDraft(facets);

  const skip = facets.bed.slice();
  for (let t = 0; t < skip.length; t++) {
    if (holes.bore[t] || ceiling[t] || visibility.visible[t] + visibility.shadowed[t] < 0.5) skip[t] = 1;
  }
  const { machine, print, limits } = effective;
  const frameMm = machine.frameMm ?? [
    size[0] + 2 * machine.frameMarginMm,
    size[1] + 2 * machine.frameMarginMm,
  ];
  const here = (at: Point): Point => [at[0] + mesh.centre[0], at[1] + mesh.centre[1], at[2]];
  const areas = undercutAreas(facets, visibility, holes.bore);
  const meshReport = describeMesh(prepared, facets, columns);
  const volume = meshReport.unionVolumeMm3;

  const sections: CheckInput['report'] = {
    schema: 1,
    engine: ENGINE_VERSION,
    input: {
      sha256: raw.sha256,
      bytes: bytes.length,
      format: raw.format,
      unit: effective.mesh.unit,
      triangles: raw.triangles,
    },
    recipe: effective,
    mesh: meshReport,
    draft: { ...draft, wallMinMacroDeg: measureMacroDraft(mesh, facets, skip, Math.max(...size)) },
    plan: measurePlan({
      mesh,
      facets,
      edges,
      columns,
      visibility,
      bore: holes.bore,
      boreAreaMm2: holes.boreAreaMm2,
      surface: holes.surface,
      frameMm: [frameMm[0], frameMm[1]],
      heightMm: size[2],
      watertight: meshReport.watertight,
    }),
    undercut: {
      ...areas,
      undercutVolumeMm3: air.undercutVolume,
      enclosedVolumeMm3: air.enclosedVolume,
      shadowVolumeMm3: air.undercutVolume + air.enclosedVolume,
      maxDepthMm: regions.length > 0 ? regions[0].maxDepthMm : 0,
      regions: regions.map((region) => ({ ...region, at: here(region.at) })),
    },
    airTraps: traps.map((trap) => ({ ...trap, floor: here(trap.floor) })),
    vents: holes.vents.map((vent) => ({ ...vent, at: here(vent.at) })),
    spacing: spacing.map((pair) => ({ ...pair, between: [here(pair.between[0]), here(pair.between[1])] })),
    walls: measureWalls(mesh, facets, columns, air, visibility, holes.bore),
    edges: withPlaces(measureEdges(mesh, facets, edges, visibility, holes.bore), here),
    sheet: null,
    layers: measureLayers(facets, print.layerMm, limits.layerGrooveMm),
    air: [],
    ventMarks: [],
    heat: null,
    skin: null,
    wallsUnderPressure: null,
    print: estimatePrint({ volumeMm3: volume, heightMm: size[2], ...facingAreas(facets) }, effective),
  };

  return stages.run('checks', () => {
    const wanted = wantedDraft({
      sanded: print.sanded,
      minDeg: limits.draftMinDeg,
      failDeg: limits.draftFailDeg,
      layerDraftDeg: sections.layers.layerDraftDeg,
    });
    const checks = runChecks({
      recipe: effective,
      report: sections,
      walls: judgeWalls(mesh, facets, draftOfFacet, visibility, holes.bore, wanted),
      wantedDraftDeg: wanted,
      overhangs: findOverhangs(mesh, facets, holes.bore, limits.overhangDeg),
      geometryOnly: options.geometryOnly ?? false,
      sizeMm: size,
    });
    const report: Report = { ...sections, advice: [], checks, timings: stages.timings };
    stages.finish();
    return {
      report,
      geometry: {
        positions: facetPositions(mesh),
        facetDraftDeg: draftOfFacet,
        facetFlags: facetFlags(facets, visibility),
        heightField: {
          cellMm: grid.cell,
          nx: grid.nx,
          ny: grid.ny,
          originX: grid.x0 + mesh.centre[0],
          originY: grid.y0 + mesh.centre[1],
          heights: Float32Array.from(columns.height),
        },
      },
    };
  });
}

function withPlaces<T extends { places: { at: Point; areaMm2: number }[] }>(
  section: T,
  here: (at: Point) => Point,
): T {
  return { ...section, places: section.places.map((place) => ({ ...place, at: here(place.at) })) };
}

/** Areas of walls, and of tops and undersides, for the print estimate. */
function facingAreas(facets: ReturnType<typeof measureFacets>) {
  let wallAreaMm2 = 0;
  let topAreaMm2 = 0;
  let bottomAreaMm2 = 0;
  for (let t = 0; t < facets.area.length; t++) {
    const area = facets.area[t];
    wallAreaMm2 += area * Math.sqrt(Math.max(0, 1 - facets.nz[t] ** 2));
    if (facets.nz[t] > 0) topAreaMm2 += area * facets.nz[t];
    else bottomAreaMm2 -= area * facets.nz[t];
  }
  return { wallAreaMm2, topAreaMm2, bottomAreaMm2 };
}
