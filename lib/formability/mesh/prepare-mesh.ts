import type { RawMesh } from '../parse/raw-mesh';
import type { MeshPlace, MeshRepair, MeshWarning, Point } from '../report';
import { UnusableInput } from '../unusable-input';
import { buildEdges, isBalanced, isClosed, type Edges } from './build-edges';
import { capHoles, type Capped } from './cap-holes';
import { dropFacets, markCollapsed, markDuplicates } from './drop-facets';
import { shellBoxes } from './facet-boxes';
import { findShells, type Shells } from './find-shells';
import { gatherFaults } from './gather-faults';
import { gatherPlaces, placesOfBoxes } from './gather-places';
import { measureFacets, type Facets } from './measure-facets';
import type { Mesh } from './mesh';
import { orientShells } from './orient-shells';
import { placeMesh, placePoint, type Placed, type Placing } from './place-mesh';
import { rewindFacets } from './rewind-facets';
import { sortTriangles } from './sort-triangles';
import { splitTJunctions } from './split-t-junctions';
import { storedVolume } from './stored-volume';
import { weldTolerant } from './weld-tolerant';
import { weldVertices, type Weld } from './weld-vertices';

/** Vertices this near, in mm, are one (engine contract). */
const WELD_MM = 1e-4;
/** Above this many facets a report is still made, with a warning. */
const MANY_FACETS = 4_000_000;
/** A float32 step of the largest coordinate beyond this, in mm, blurs the shape. */
const COARSE_STEP_MM = 2e-3;

/** A mesh ready to measure, the facts about the file as stored, and what was mended on the way. */
export interface Prepared extends Placed {
  /** Of the mesh after repair. */
  facets: Facets;
  edges: Edges;
  shells: Shells;
  /** The mesh with its holes closed, where it has any. */
  capped: Capped;
  /** As stored. */
  facts: {
    watertight: boolean;
    edges: { boundary: number; nonManifold: number; inconsistent: number };
    volume: number;
    degenerate: number;
    duplicates: number;
  };
  /** What the file's coordinates can tell apart, and no less than what is welded: mm. */
  toleranceMm: number;
  warnings: Set<MeshWarning>;
  repairs: Set<MeshRepair>;
  places: MeshPlace[];
}

/**
 * Weld, place, judge, repair. The order matters: facts are taken after the weld and before any other repair.
 * @throws UnusableInput no_triangles where no facet has an area.
 */
export function prepareMesh(raw: RawMesh, placing: Placing): Prepared {
  const warnings = new Set<MeshWarning>(raw.warnings);
  const repairs = new Set<MeshRepair>();
  const { weld, edges: stored, joined } = weldFully(raw, placing);
  const placed = placeMesh(weld, placing);
  const { mesh } = placed;
  const toleranceMm = Math.max(WELD_MM, 4 * placed.reach * 2 ** -23);
  const asStored = measureFacets(mesh);
  if (asStored.totalArea === 0) {
    throw new UnusableInput('no_triangles', 'no facet of the file has an area; export the body again');
  }
  const places = placeAgainst(raw, placing, placed);
  if (joined.length > 0) {
    warnings.add('needs_tolerant_weld');
    repairs.add('tolerant_weld');
    places.push(...gatherPlaces('needs_tolerant_weld', mesh.position, mesh.centre, joined, 1));
  }
  const { boundary, nonManifold, inconsistent } = stored;
  const { degenerate } = asStored;
  const facts = {
    watertight: isClosed(stored),
    edges: { boundary, nonManifold, inconsistent },
    volume: storedVolume(raw.coords, isBalanced(stored)) * placing.mmPerUnit ** 3,
    degenerate,
    duplicates: 0,
  };
  if (degenerate > 0) warnings.add('degenerate_triangles');
  if (nonManifold > 0) warnings.add('nonmanifold_edge');
  if (boundary > 0) warnings.add('not_watertight');
  if (inconsistent > 0) warnings.add('inconsistent_winding');
  if (mesh.triangles > MANY_FACETS) warnings.add('too_large');
  if (placed.reach * 2 ** -24 > COARSE_STEP_MM) warnings.add('precision');

  const { drop, duplicate } = markWaste(mesh, stored, asStored);
  places.push(...gatherFaults(mesh, stored, asStored, duplicate));
  let edges = stored;
  if (drop) {
    if (markCollapsed(mesh.index, drop) > 0) repairs.add('removed_degenerate');
    if (duplicate) {
      facts.duplicates = duplicate.reduce((sum, one) => sum + one, 0);
      warnings.add('duplicate_triangles');
      repairs.add('removed_duplicates');
    }
    edges = takeIndex(mesh, dropFacets(mesh.index, drop));
  }
  if (edges.boundary > 0) edges = mendTJunctions(mesh, edges, toleranceMm, warnings, repairs, places);
  const shells = findShells(mesh.index, mesh.vertices);
  if (edges.inconsistent > 0 && rewindFacets(mesh.index, edges) > 0) {
    repairs.add('rewound_facets');
    edges = takeIndex(mesh, mesh.index);
  }
  const turned = orientShells(mesh, shells, edges);
  if (turned.length > 0) {
    repairs.add('flipped_inside_out');
    if (!warnings.has('inconsistent_winding')) {
      warnings.add('inverted');
      places.push(...placesOfShells(mesh, shells, turned));
    }
  }
  const facets = repairs.size === 0 ? asStored : measureFacets(mesh);
  const capped = capHoles(mesh, edges, facets.totalArea);
  if (capped.atBed) repairs.add('closed_at_bed');
  if (capped.elsewhere) repairs.add('capped_holes');
  return { ...placed, facets, edges, shells, capped, facts, toleranceMm, warnings, repairs, places };
}

function weldFully(raw: RawMesh, placing: Placing): { weld: Weld; edges: Edges; joined: number[] } {
  const weld = weldVertices(sortTriangles(raw.coords));
  const edges = buildEdges(weld.index, weld.vertices);
  const asIs = { weld, edges, joined: [] };
  if (edges.boundary === 0) return asIs;
  const loose = new Uint8Array(weld.vertices);
  for (let e = 0; e < edges.count; e++) {
    if (edges.forward[e] + edges.backward[e] !== 1) continue;
    loose[edges.low[e]] = 1;
    loose[edges.high[e]] = 1;
  }
  const tighter = weldTolerant(weld, loose, WELD_MM / placing.mmPerUnit);
  if (tighter.joined.length === 0) return asIs;
  const tighterEdges = buildEdges(tighter.index, tighter.vertices);
  if (tighterEdges.boundary >= edges.boundary) return asIs;
  return { weld: tighter, edges: tighterEdges, joined: tighter.joined };
}

/** Facets to leave out: collapsed ones and repeated ones; nulls where there is nothing of the kind. */
function markWaste(
  mesh: Mesh,
  edges: Edges,
  facets: Facets,
): { drop: Uint8Array | null; duplicate: Uint8Array | null } {
  if (facets.degenerate + edges.nonManifold + edges.inconsistent === 0)
    return { drop: null, duplicate: null };
  const drop = new Uint8Array(mesh.triangles);
  const collapsed = facets.degenerate > 0 ? markCollapsed(mesh.index, drop) : 0;
  const duplicate = drop.slice();
  const repeated = edges.nonManifold + edges.inconsistent > 0 ? markDuplicates(mesh.index, edges, mesh.vertices, duplicate) : 0; // prettier-ignore
  for (let t = 0; t < drop.length; t++) {
    if (drop[t]) duplicate[t] = 0;
    else drop[t] = duplicate[t];
  }
  return { drop: collapsed + repeated > 0 ? drop : null, duplicate: repeated > 0 ? duplicate : null };
}

/** The first facet whose stored normal points another way, standing for all of them. */
function placeAgainst(raw: RawMesh, placing: Placing, placed: Placed): MeshPlace[] {
  if (!raw.against) return [];
  const { count, facet } = raw.against;
  const c = raw.coords.subarray(9 * facet, 9 * facet + 9);
  const middle: Point = [(c[0] + c[3] + c[6]) / 3, (c[1] + c[4] + c[7]) / 3, (c[2] + c[5] + c[8]) / 3];
  return [{ code: 'normals_disagree', at: placePoint(middle, placing, placed), count, sizeMm: 0 }];
}

function takeIndex(mesh: Mesh, index: Uint32Array): Edges {
  mesh.index = index;
  mesh.triangles = index.length / 3;
  return buildEdges(index, mesh.vertices);
}

function mendTJunctions(
  mesh: Mesh,
  edges: Edges,
  tolerance: number,
  warnings: Set<MeshWarning>,
  repairs: Set<MeshRepair>,
  places: MeshPlace[],
): Edges {
  const split = splitTJunctions(mesh.index, mesh.position, edges, tolerance);
  if (split === null) return edges;
  warnings.add('t_junction');
  places.push(...gatherPlaces('t_junction', mesh.position, mesh.centre, split.vertices, 1));
  const mended = buildEdges(split.index, mesh.vertices);
  if (mended.boundary >= edges.boundary) return edges;
  repairs.add('split_at_t_junctions');
  return takeIndex(mesh, split.index);
}

function placesOfShells(mesh: Mesh, shells: Shells, which: number[]): MeshPlace[] {
  return placesOfBoxes(
    'inverted',
    shellBoxes(mesh.index, mesh.position, shells.ofFacet, shells.count),
    which,
    mesh.centre,
  );
}
