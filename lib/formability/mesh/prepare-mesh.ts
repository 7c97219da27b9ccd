import type { RawMesh } from '../parse/raw-mesh';
import type { MeshRepair, MeshWarning } from '../report';
import { UnusableInput } from '../unusable-input';
import { buildEdges, isClosed, type Edges } from './build-edges';
import { dropFacets, markCollapsed, markDuplicates } from './drop-facets';
import { findShells, type Shells } from './find-shells';
import { measureFacets, type Facets } from './measure-facets';
import { orientShells } from './orient-shells';
import { placeMesh, type Placed, type Placing } from './place-mesh';
import { rewindFacets } from './rewind-facets';
import { signedVolume } from './signed-volume';
import { sortTriangles } from './sort-triangles';
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
  /** As stored. */
  facts: {
    watertight: boolean;
    edges: { boundary: number; nonManifold: number; inconsistent: number };
    volume: number;
    degenerate: number;
    duplicates: number;
  };
  warnings: Set<MeshWarning>;
  repairs: Set<MeshRepair>;
}

/**
 * Weld, place, judge, repair. The order matters: facts are taken after the weld and before any other repair.
 * @throws UnusableInput no_triangles where no facet has an area.
 */
export function prepareMesh(raw: RawMesh, placing: Placing): Prepared {
  const warnings = new Set<MeshWarning>(raw.warnings);
  const repairs = new Set<MeshRepair>();
  const { weld, edges: stored } = weldFully(raw, placing, warnings, repairs);
  const placed = placeMesh(weld, placing);
  const { mesh } = placed;
  const asStored = measureFacets(mesh);
  const { degenerate, totalArea } = asStored;
  if (totalArea === 0) {
    throw new UnusableInput('no_triangles', 'no facet of the file has an area; export the body again');
  }
  const closed = isClosed(stored);
  const volume = closed ? signedVolume(mesh, 0, 0) : signedVolume(mesh, -mesh.centre[0], -mesh.centre[1]);
  const { boundary, nonManifold, inconsistent } = stored;
  const facts = {
    watertight: closed,
    edges: { boundary, nonManifold, inconsistent },
    volume,
    degenerate,
    duplicates: 0,
  };
  if (degenerate > 0) warnings.add('degenerate_triangles');
  if (nonManifold > 0) warnings.add('nonmanifold_edge');
  if (boundary > 0) warnings.add('not_watertight');
  if (mesh.triangles > MANY_FACETS) warnings.add('too_large');
  if (placed.reach * 2 ** -24 > COARSE_STEP_MM) warnings.add('precision');

  const drop = new Uint8Array(mesh.triangles);
  if (degenerate > 0 && markCollapsed(mesh.index, drop) > 0) repairs.add('removed_degenerate');
  if (nonManifold + inconsistent > 0) {
    facts.duplicates = markDuplicates(mesh.index, stored, mesh.vertices, drop);
    if (facts.duplicates > 0) {
      warnings.add('duplicate_triangles');
      repairs.add('removed_duplicates');
    }
  }
  let edges = stored;
  if (repairs.has('removed_degenerate') || facts.duplicates > 0) {
    mesh.index = dropFacets(mesh.index, drop);
    mesh.triangles = mesh.index.length / 3;
    edges = buildEdges(mesh.index, mesh.vertices);
  }
  const shells = findShells(mesh.index, mesh.vertices);
  if (edges.inconsistent > 0) {
    warnings.add('inconsistent_winding');
    if (rewindFacets(mesh.index, edges) > 0) repairs.add('rewound_facets');
  }
  if (orientShells(mesh, shells) > 0) {
    if (!warnings.has('inconsistent_winding')) warnings.add('inverted');
    repairs.add('flipped_inside_out');
  }
  const facets = repairs.size === 0 ? asStored : measureFacets(mesh);
  return { ...placed, facets, edges, shells, facts, warnings, repairs };
}

function weldFully(
  raw: RawMesh,
  placing: Placing,
  warnings: Set<MeshWarning>,
  repairs: Set<MeshRepair>,
): { weld: Weld; edges: Edges } {
  const weld = weldVertices(sortTriangles(raw.coords));
  const edges = buildEdges(weld.index, weld.vertices);
  if (edges.boundary === 0) return { weld, edges };
  const loose = new Uint8Array(weld.vertices);
  for (let e = 0; e < edges.count; e++) {
    if (edges.forward[e] + edges.backward[e] !== 1) continue;
    loose[edges.low[e]] = 1;
    loose[edges.high[e]] = 1;
  }
  const tighter = weldTolerant(weld, loose, WELD_MM / placing.mmPerUnit);
  if (tighter.vertices === weld.vertices) return { weld, edges };
  const tighterEdges = buildEdges(tighter.index, tighter.vertices);
  if (tighterEdges.boundary >= edges.boundary) return { weld, edges };
  warnings.add('needs_tolerant_weld');
  repairs.add('tolerant_weld');
  return { weld: tighter, edges: tighterEdges };
}
