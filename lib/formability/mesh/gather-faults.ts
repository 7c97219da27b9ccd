import type { MeshPlace } from '../report';
import type { Edges } from './build-edges';
import { gatherPlaces } from './gather-places';
import type { Facets } from './measure-facets';
import type { Mesh } from './mesh';

/** Places of what is wrong with edges and facets of the mesh as stored; nothing is looked for where nothing is wrong. */
export function gatherFaults(
  mesh: Mesh,
  edges: Edges,
  facets: Facets,
  duplicate: Uint8Array | null,
): MeshPlace[] {
  const { position, centre, index } = mesh;
  const places: MeshPlace[] = [];
  const edgesWhere = (wanted: (uses: number, forward: number) => boolean) => {
    const found: number[] = [];
    for (let e = 0; e < edges.count; e++) {
      if (wanted(edges.forward[e] + edges.backward[e], edges.forward[e]))
        found.push(edges.low[e], edges.high[e]);
    }
    return found;
  };
  const facetsWhere = (wanted: (t: number) => boolean) => {
    const found: number[] = [];
    for (let t = 0; t < mesh.triangles; t++) {
      if (wanted(t)) found.push(index[3 * t], index[3 * t + 1], index[3 * t + 2]);
    }
    return found;
  };
  if (edges.boundary > 0) {
    const open = edgesWhere((uses) => uses === 1);
    places.push(...gatherPlaces('not_watertight', position, centre, open, 2));
  }
  if (edges.nonManifold > 0) {
    const crowded = edgesWhere((uses) => uses > 2);
    places.push(...gatherPlaces('nonmanifold_edge', position, centre, crowded, 2));
  }
  if (edges.inconsistent > 0) {
    const against = edgesWhere((uses, forward) => uses === 2 && forward !== 1);
    places.push(...gatherPlaces('inconsistent_winding', position, centre, against, 2));
  }
  if (facets.degenerate > 0) {
    const flat = facetsWhere((t) => facets.area[t] === 0);
    places.push(...gatherPlaces('degenerate_triangles', position, centre, flat, 3));
  }
  if (duplicate) {
    const twice = facetsWhere((t) => duplicate[t] === 1);
    places.push(...gatherPlaces('duplicate_triangles', position, centre, twice, 3));
  }
  return places;
}
