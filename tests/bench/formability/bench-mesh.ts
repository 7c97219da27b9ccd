import { ballOnStem } from '../../fixtures/meshes/solids';
import { reordered } from '../../fixtures/meshes/triangles';

/** A ball on a stem of about `triangles` facets: curved everywhere, with an undercut all round. */
export function benchMesh(triangles: number, order: 'ordered' | 'shuffled' = 'ordered'): number[] {
  const n = Math.round(Math.sqrt(triangles / 2));
  const mesh = ballOnStem(40, 12, 60, n, n);
  if (order === 'ordered') return mesh;
  // Linear congruential generator, seed 1: the order only has to be without any locality.
  const facets = Array.from({ length: mesh.length / 9 }, (_, i) => i);
  let state = 1;
  for (let i = facets.length - 1; i > 0; i--) {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    const j = state % (i + 1);
    [facets[i], facets[j]] = [facets[j], facets[i]];
  }
  return reordered(mesh, facets);
}
