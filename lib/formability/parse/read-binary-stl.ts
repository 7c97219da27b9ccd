import type { MeshWarning } from '../report';
import { UnusableInput } from '../unusable-input';
import type { RawMesh } from './raw-mesh';

const HEADER = 84;
const FACET = 50;

/**
 * Reads a binary STL: 80 bytes of header, uint32 count, 50 bytes a facet, little-endian. The count is checked
 * against the bytes before anything is allocated; stored normals serve only for the warning `normals_disagree`.
 * @throws UnusableInput truncated, count_mismatch, no_triangles, not_a_mesh, non_finite, out_of_range.
 */
export function readBinaryStl(bytes: Uint8Array): RawMesh {
  const length = bytes.length;
  if (length < HEADER) {
    throw new UnusableInput(
      'truncated',
      `the file ends after ${length} bytes, before the facet count of a binary STL at byte 80; upload it again or export it again`,
    );
  }
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const count = view.getUint32(80, true);
  const warnings: MeshWarning[] = [];
  checkCount(view, count, length, warnings);
  const { coords, against } = readFacets(view, count);
  if (against) warnings.push('normals_disagree');
  return { format: 'stl-binary', triangles: count, coords, warnings, against };
}

function checkCount(view: DataView, count: number, length: number, warnings: MeshWarning[]): void {
  const whole = Math.floor((length - HEADER) / FACET);
  const rest = (length - HEADER) % FACET;
  if (count > whole) {
    if (whole > 0 && !facetsLookReal(view, 0, Math.min(whole, 64))) {
      throw new UnusableInput('not_a_mesh', 'the file is neither a binary STL (its facets hold no coordinates) nor an ASCII one; choose the STL, 3MF or STEP file of the template'); // prettier-ignore
    }
    const have = `the header says ${count} facets, the file has room for ${whole}`;
    if (rest === 0) {
      throw new UnusableInput('count_mismatch', `${have}; export the mesh again`, [have]);
    }
    throw new UnusableInput('truncated', `${have} and ends ${rest} bytes into the next one; upload it again or export it again`, [have]); // prettier-ignore
  }
  if (count === 0) {
    if (whole > 0 && rest === 0 && facetsLookReal(view, 0, whole)) {
      throw new UnusableInput('count_mismatch', `the header says 0 facets, the file holds ${whole}; export the mesh again`); // prettier-ignore
    }
    throw new UnusableInput(
      'no_triangles',
      'the file holds no facets; export the body, not an empty selection',
    );
  }
  if (count < whole || rest > 0) {
    const extra = whole - count;
    if (extra > 0 && rest === 0 && facetsLookReal(view, count, Math.min(extra, 64))) {
      throw new UnusableInput('count_mismatch', `the header says ${count} facets, the file holds ${whole}; export the mesh again`); // prettier-ignore
    }
    warnings.push('trailing_data');
  }
}

/** True where facets `from` to `from + n` hold finite, sizeable coordinates and at least one has an area. */
function facetsLookReal(view: DataView, from: number, n: number): boolean {
  let withArea = 0;
  for (let i = 0; i < n; i++) {
    const at = HEADER + (from + i) * FACET + 12;
    const c: number[] = [];
    for (let k = 0; k < 9; k++) c.push(view.getFloat32(at + 4 * k, true));
    if (c.some((value) => !Number.isFinite(value) || Math.abs(value) > 1e9)) return false;
    if (c.some((value) => value !== 0 && Math.abs(value) < 1e-30)) return false;
    const distinct = c.slice(0, 3).some((value, k) => value !== c[3 + k] || value !== c[6 + k]);
    if (distinct) withArea++;
  }
  return withArea > 0;
}

function readFacets(view: DataView, count: number): Pick<RawMesh, 'coords' | 'against'> {
  const coords = new Float32Array(count * 9);
  let against = 0;
  let first = -1;
  for (let i = 0, o = 0, at = HEADER; i < count; i++, o += 9, at += FACET) {
    const ax = (coords[o] = view.getFloat32(at + 12, true));
    const ay = (coords[o + 1] = view.getFloat32(at + 16, true));
    const az = (coords[o + 2] = view.getFloat32(at + 20, true));
    const ux = (coords[o + 3] = view.getFloat32(at + 24, true)) - ax;
    const uy = (coords[o + 4] = view.getFloat32(at + 28, true)) - ay;
    const uz = (coords[o + 5] = view.getFloat32(at + 32, true)) - az;
    const vx = (coords[o + 6] = view.getFloat32(at + 36, true)) - ax;
    const vy = (coords[o + 7] = view.getFloat32(at + 40, true)) - ay;
    const vz = (coords[o + 8] = view.getFloat32(at + 44, true)) - az;
    const nx = uy * vz - uz * vy;
    const ny = uz * vx - ux * vz;
    const nz = ux * vy - uy * vx;
    const sx = view.getFloat32(at, true);
    const sy = view.getFloat32(at + 4, true);
    const sz = view.getFloat32(at + 8, true);
    const dot = nx * sx + ny * sy + nz * sz;
    // Half the product of the lengths: more than 60° off is not a rounding of the exporter.
    if (
      dot < 0 ||
      (dot > 0 && 4 * dot * dot < (nx * nx + ny * ny + nz * nz) * (sx * sx + sy * sy + sz * sz))
    ) {
      against++;
      if (first < 0) first = i;
    }
  }
  return against > count / 100 ? { coords, against: { count: against, facet: first } } : { coords };
}
