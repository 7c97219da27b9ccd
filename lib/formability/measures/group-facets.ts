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
  chosen: readonly number[],
  most: number,
  value?: Float32Array,
): (Place & { least: number })[] {
  const { index, position: p, centre } = mesh;
  const joined = new UnionFind(mesh.vertices);
  for (const t of chosen) {
    joined.join(index[3 * t], index[3 * t + 1]);
    joined.join(index[3 * t], index[3 * t + 2]);
  }
  const groups = new Map<number, { area: number; largest: number; least: number }>();
  for (const t of chosen) {
    const root = joined.find(index[3 * t]);
    const group = groups.get(root);
    const own = value ? value[t] : NaN;
    if (!group) groups.set(root, { area: area[t], largest: t, least: own });
    else {
      if (own < group.least) group.least = own;
      group.area += area[t];
      if (area[t] > area[group.largest]) group.largest = t;
    }
  }
  return Array.from(groups.values())
    .sort((a, b) => b.area - a.area || a.largest - b.largest)
    .slice(0, most)
    .map(({ area: sum, largest, least }) => {
      const corners = [0, 1, 2].map((k) => index[3 * largest + k] * 3);
      const at = [0, 1, 2].map((k) => corners.reduce((total, v) => total + p[v + k], 0) / 3);
      return { at: [at[0] + centre[0], at[1] + centre[1], at[2]], areaMm2: sum, least };
    });
}
