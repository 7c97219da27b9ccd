import type { Mesh } from './mesh';

/** Per-facet figures that everything else starts from. */
export interface Facets {
  /** mm². */
  area: Float64Array;
  /** Unit outward normal; 0 where the facet has no area. The pull lies along z, so z has the digits. */
  nx: Float32Array;
  ny: Float32Array;
  nz: Float64Array;
  /** 1 where all three vertices lie on the bed (z ≤ 1e-4) and the normal faces down. */
  bed: Uint8Array;
  totalArea: number;
  bedArea: number;
  degenerate: number;
}

export const BED_TOLERANCE_MM = 1e-4;
/** A facet lower than this share of its longest side has no area to speak of. */
const NEEDLE = 1e-7;

/** Areas, normals and bed facets in one pass. */
export function measureFacets(mesh: Mesh): Facets {
  const { triangles, index, position } = mesh;
  const area = new Float64Array(triangles);
  const nx = new Float32Array(triangles);
  const ny = new Float32Array(triangles);
  const nz = new Float64Array(triangles);
  const bed = new Uint8Array(triangles);
  let totalArea = 0;
  let bedArea = 0;
  let degenerate = 0;
  for (let t = 0, c = 0; t < triangles; t++, c += 3) {
    const a = index[c] * 3;
    const b = index[c + 1] * 3;
    const d = index[c + 2] * 3;
    const az = position[a + 2];
    const ux = position[b] - position[a];
    const uy = position[b + 1] - position[a + 1];
    const uz = position[b + 2] - az;
    const vx = position[d] - position[a];
    const vy = position[d + 1] - position[a + 1];
    const vz = position[d + 2] - az;
    const x = uy * vz - uz * vy;
    const y = uz * vx - ux * vz;
    const z = ux * vy - uy * vx;
    const twice = Math.sqrt(x * x + y * y + z * z);
    const one = ux * ux + uy * uy + uz * uz;
    const other = vx * vx + vy * vy + vz * vz;
    const third = (ux - vx) * (ux - vx) + (uy - vy) * (uy - vy) + (uz - vz) * (uz - vz);
    const longer = one > other ? one : other;
    if (!(twice > NEEDLE * (longer > third ? longer : third))) {
      degenerate++;
      continue;
    }
    area[t] = twice / 2;
    nx[t] = x / twice;
    ny[t] = y / twice;
    nz[t] = z / twice;
    totalArea += twice / 2;
    if (
      z < 0 &&
      az <= BED_TOLERANCE_MM &&
      position[b + 2] <= BED_TOLERANCE_MM &&
      position[d + 2] <= BED_TOLERANCE_MM
    ) {
      bed[t] = 1;
      bedArea += twice / 2;
    }
  }
  return { area, nx, ny, nz, bed, totalArea, bedArea, degenerate };
}
