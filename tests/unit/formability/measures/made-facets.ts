import type { Facets } from '@/lib/formability/mesh/measure-facets';
import type { Mesh } from '@/lib/formability/mesh/mesh';
import { markTouched, type Visibility } from '@/lib/formability/measures/visibility';

export interface Leaning {
  /** Draft of the facet, degrees. */
  deg: number;
  areaMm2: number;
  /** From its lowest corner to its highest, mm. */
  highMm?: number;
  /** Of its lowest corner, mm. */
  footMm?: number;
}

/** Facets with just these drafts and areas, side by side and apart from one another: what a measure reads of a mesh. */
export function madeFacets(leaning: readonly Leaning[]) {
  const count = leaning.length;
  const facets: Facets = {
    area: Float64Array.from(leaning, ({ areaMm2 }) => areaMm2),
    nx: Float32Array.from(leaning, ({ deg }) => Math.cos(rad(deg))),
    ny: new Float32Array(count),
    nz: Float64Array.from(leaning, ({ deg }) => Math.sin(rad(deg))),
    bed: new Uint8Array(count),
    totalArea: leaning.reduce((sum, { areaMm2 }) => sum + areaMm2, 0),
    bedArea: 0,
    degenerate: 0,
  };
  const corners = leaning.flatMap(({ highMm = 10, footMm = 0 }, t) => [t, 0, footMm, t + 0.5, 0, footMm, t, 0, footMm + highMm]); // prettier-ignore
  const mesh: Mesh = {
    triangles: count,
    vertices: 3 * count,
    index: Uint32Array.from({ length: 3 * count }, (_, k) => k),
    position: Float64Array.from(corners),
    centre: [0, 0],
  };
  const visible = new Float32Array(count).fill(1);
  const shadowed = new Float32Array(count);
  const touched = markTouched(visible, shadowed);
  const seen: Visibility = { visible, shadowed, enclosed: new Float32Array(count), touched };
  return {
    facets,
    mesh,
    seen,
    none: new Uint8Array(count),
    draft: Float32Array.from(leaning, ({ deg }) => deg),
  };
}

function rad(deg: number): number {
  return (deg * Math.PI) / 180;
}
