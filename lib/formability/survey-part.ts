import { connectAir, type Air } from './dexel/air';
import { affordGrid } from './dexel/afford-grid';
import { buildColumns, type Columns } from './dexel/columns';
import { forgetFacets } from './dexel/forget-facets';
import { makeGrid } from './dexel/grid';
import { rasterise } from './dexel/raster';
import { buildFacetGrid } from './measures/facet-grid';
import { findAirTraps } from './measures/find-air-traps';
import { findSpacing } from './measures/find-spacing';
import { findUndercuts, type Undercuts } from './measures/find-undercuts';
import type { Flood } from './measures/map-pockets';
import { findThinUndercuts } from './measures/find-thin-undercuts';
import { findVents, type Vents } from './measures/find-vents';
import { findWalls, type WallFacets } from './measures/judge-walls';
import { measureDetails } from './measures/measure-details';
import { measureDraft } from './measures/measure-draft';
import { measureWalls, type Walls } from './measures/measure-walls';
import { refineDepth } from './measures/refine-depth';
import { refinePits } from './measures/refine-pits';
import { findVisibility, type Visibility } from './measures/visibility';
import type { Facets } from './mesh/measure-facets';
import { prepareMesh, type Prepared } from './mesh/prepare-mesh';
import type { RawMesh } from './parse/raw-mesh';
import { MM_PER_UNIT, type EffectiveRecipe } from './recipe';
import type { AirTrap, Point, Spacing } from './report';
import type { DetailReport } from './report-walls';
import type { Stages } from './stages';

/** Everything that the report is written from, in the mesh's own frame. */
export interface Part {
  prepared: Prepared;
  facets: Facets;
  columns: Columns;
  air: Air;
  undercuts: Undercuts;
  holes: Vents;
  traps: AirTrap[];
  flood: Flood;
  spacing: Spacing[];
  visibility: Visibility;
  draft: ReturnType<typeof measureDraft>;
  wallFacets: WallFacets;
  walls: Walls;
  detail: DetailReport;
  /** Width, depth, height above the bed. */
  size: Point;
}

/**
 * Mesh, columns, air, pits and facets, stage by stage.
 * @throws UnusableInput no_triangles, stopped
 */
export function surveyPart(raw: RawMesh, recipe: EffectiveRecipe, stages: Stages): Part {
  const { print, limits } = recipe;
  const mmPerUnit = MM_PER_UNIT[recipe.mesh.unit];
  const prepared = stages.run('mesh', () => prepareMesh(raw, { mmPerUnit, ...recipe.mesh }));
  const { facets } = prepared;
  const { mesh, shells, edges, min, max } = prepared;
  const size: Point = [max[0] - min[0], max[1] - min[1], Math.max(0, max[2])];

  const { columns, perFacet } = stages.run('columns', () => {
    const low = [min[0] - mesh.centre[0], min[1] - mesh.centre[1]];
    const high = [max[0] - mesh.centre[0], max[1] - mesh.centre[1]];
    const grid = affordGrid(mesh, makeGrid(low, high, recipe.grid.cellMm));
    // Only a closed surface is sure to leave each column as often as it enters it.
    const { capped } = prepared;
    const hits = rasterise(capped.mesh, grid, capped.sealed ? 0 : 2);
    if (capped.mesh !== mesh) forgetFacets(hits, mesh.triangles);
    return { columns: buildColumns(hits, grid, shells.ofFacet), perFacet: hits.perFacet };
  });
  const { grid } = columns;
  const holes = stages.run('vents', () =>
    findVents(mesh, facets, edges, columns, shells.ofFacet, print.holeModel),
  );
  // Vents closed: no sheet goes through them, so a vented hollow template is no undercut.
  const air = stages.run('air', () => connectAir(columns, 'open', holes.surface));
  const undercuts = stages.run('undercut', () => {
    const found = findUndercuts(columns, air, limits.undercutDepthMm, mesh.triangles);
    refineDepth(mesh, found.regions, grid.cell, shells.ofFacet);
    return found;
  });
  const facetGrid = stages.run('sort', () => buildFacetGrid(mesh, facets));
  const { traps, flood, spacing } = stages.run('pits', () => {
    const { surface, vents } = holes;
    const found = findAirTraps(surface, grid, vents, (pits) =>
      refinePits(mesh, facetGrid, surface, grid, shells.ofFacet, pits),
    );
    return { ...found, spacing: findSpacing(mesh, facetGrid, surface, grid, found.pits) };
  });
  const { visibility, draft, wallFacets } = stages.run('facets', () => {
    const visibility = findVisibility(mesh, facets, columns, air, perFacet);
    findThinUndercuts(mesh, facets, visibility, grid.cell, shells.ofFacet, limits.undercutDepthMm, undercuts);
    const draft = measureDraft(facets);
    return {
      visibility,
      draft,
      wallFacets: findWalls(facets, draft.ofFacet, visibility.touched, holes.bore),
    };
  });
  const { walls, detail } = stages.run('walls', () => {
    const walls = measureWalls(mesh, facets, facetGrid, columns, air, visibility, holes.bore);
    const detail = measureDetails(mesh, facets, facetGrid, visibility, holes.bore, walls.sampled);
    return { walls, detail };
  });
  return {
    prepared,
    facets,
    columns,
    air,
    undercuts,
    holes,
    traps,
    flood,
    spacing,
    visibility,
    draft,
    wallFacets,
    walls,
    detail,
    size,
  };
}
