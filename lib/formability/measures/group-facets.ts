import type { Mesh } from '../mesh/mesh';
import { UnionFind } from '../mesh/union-find';
import type { Place } from '../report';

/**
 * Connected groups of the chosen facets (over shared vertices), the largest first: the place is the middle of the
 * group's largest facet, so it lies on the surface.
 * @param value where given, each group's least of it is told too
 */
export function groupFacets(
  mesh: Mesh,
  area: Float64Array,
  chosen: Uint32Array,
  most: number,
  value?: Float32Array,
): (Place & { least: number })[] {
  const { index, position: p, centre } = mesh;
  const groupOf = joinFacets(index, mesh.vertices, chosen);
  const sums: number[] = [];
  const largest: number[] = [];
  const least: number[] = [];
  for (let k = 0; k < chosen.length; k++) {
    const t = chosen[k];
    const group = groupOf[k];
    const own = value ? value[t] : NaN;
    if (group === sums.length) {
      sums.push(area[t]);
      largest.push(t);
      least.push(own);
      continue;
    }
    if (own < least[group]) least[group] = own;
    sums[group] += area[t];
    if (area[t] > area[largest[group]]) largest[group] = t;
  }
  return sums
    .map((_, group) => group)
    .sort((a, b) => sums[b] - sums[a] || largest[a] - largest[b])
    .slice(0, most)
    .map((group) => {
      const corners = [0, 1, 2].map((k) => index[3 * largest[group] + k] * 3);
      const at = [0, 1, 2].map((k) => corners.reduce((total, v) => total + p[v + k], 0) / 3);
      return {
        at: [at[0] + centre[0], at[1] + centre[1], at[2]],
        areaMm2: sums[group],
        least: least[group],
      };
    });
}

/** The group of each chosen facet, numbered in the order in which they are met. */
function joinFacets(index: Uint32Array, vertices: number, chosen: Uint32Array): Int32Array {
  const joined = new UnionFind(vertices);
  for (let k = 0; k < chosen.length; k++) {
    const c = 3 * chosen[k];
    joined.join(index[c], index[c + 1]);
    joined.join(index[c], index[c + 2]);
  }
  const number = new Int32Array(vertices).fill(-1);
  const groupOf = new Int32Array(chosen.length);
  let groups = 0;
  for (let k = 0; k < chosen.length; k++) {
    const root = joined.find(index[3 * chosen[k]]);
    if (number[root] < 0) number[root] = groups++;
    groupOf[k] = number[root];
  }
  return groupOf;
}
