import type { MeshWarning, Point } from '../report';
import { BED_TOLERANCE_MM, type Facets } from './measure-facets';
import type { Mesh } from './mesh';
import type { Prepared } from './prepare-mesh';
import { shellVolumes } from './signed-volume';

/** The base is doubtful when it is below this share of the box in plan, and another side offers more. */
const POOR_BASE = 0.05;
const BETTER_BASE = 4;

/** Warnings about how the part stands: floating, sunk, lying on the wrong side. */
export function warnPlacing(
  prepared: Prepared,
  facets: Facets,
): { warnings: MeshWarning[]; suggestedUp: Point | null } {
  const { mesh, min, max } = prepared;
  const warnings: MeshWarning[] = [];
  if (min[2] < -BED_TOLERANCE_MM) warnings.push('below_bed');
  if (min[2] > BED_TOLERANCE_MM || anyShellFloats(prepared)) warnings.push('floating');
  const suggestedUp = betterUp(mesh, facets, min, max);
  if (suggestedUp) warnings.push('orientation');
  return { warnings, suggestedUp };
}

/** A solid shell above the bed whose box meets no other solid shell's box. */
function anyShellFloats({ mesh, shells }: Prepared): boolean {
  if (shells.count < 2 || shells.count > 2000) return false;
  const boxes = Array.from({ length: shells.count }, () => [
    Infinity,
    Infinity,
    Infinity,
    -Infinity,
    -Infinity,
    -Infinity,
  ]);
  for (let t = 0; t < mesh.triangles; t++) {
    const box = boxes[shells.ofFacet[t]];
    for (let k = 0; k < 9; k++) {
      const value = mesh.position[mesh.index[3 * t + Math.floor(k / 3)] * 3 + (k % 3)];
      if (value < box[k % 3]) box[k % 3] = value;
      if (value > box[3 + (k % 3)]) box[3 + (k % 3)] = value;
    }
  }
  const volumes = shellVolumes(mesh, shells.ofFacet, shells.count);
  return boxes.some(
    (box, shell) =>
      volumes[shell] > 0 &&
      box[2] > BED_TOLERANCE_MM &&
      !boxes.some((other, s) => s !== shell && volumes[s] > 0 && [0, 1, 2].every((k) => box[k] <= other[k + 3] + 1e-3 && box[k + 3] >= other[k] - 1e-3)), // prettier-ignore
  );
}

/** The axis direction that would stand the part on its largest flat side, or null where the present one serves. */
function betterUp(mesh: Mesh, facets: Facets, min: Point, max: Point): Point | null {
  if (facets.bedArea > POOR_BASE * (max[0] - min[0]) * (max[1] - min[1])) return null;
  const { index, position: p, centre } = mesh;
  const offset = [centre[0], centre[1], 0];
  const size = [0, 1, 2].map((k) => max[k] - min[k]);
  const near = 1e-4 * Math.max(...size) + BED_TOLERANCE_MM;
  const areas = new Float64Array(6);
  for (let t = 0; t < mesh.triangles; t++) {
    if (facets.area[t] === 0) continue;
    for (let k = 0; k < 3; k++) {
      let low = true;
      let high = true;
      for (let corner = 0; corner < 3; corner++) {
        const value = p[index[3 * t + corner] * 3 + k] + offset[k];
        if (value > min[k] + near) low = false;
        if (value < max[k] - near) high = false;
      }
      if (low) areas[2 * k] += facets.area[t];
      if (high) areas[2 * k + 1] += facets.area[t];
    }
  }
  const base = areas[4];
  const best = areas.indexOf(Math.max(...areas));
  if (areas[best] < BETTER_BASE * base + 0.1 * size[0] * size[1]) return null;
  const up: Point = [0, 0, 0];
  up[best >> 1] = best & 1 ? -1 : 1;
  return up;
}
