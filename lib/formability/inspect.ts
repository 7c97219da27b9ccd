import { checkCoordinates } from './parse/check-coordinates';
import { readMesh } from './parse/read-mesh';
import { suggestScale } from './mesh/suggest-scale';
import { MM_PER_UNIT, type MeshUnit } from './recipe';
import type { Inspection, Point } from './report';

/**
 * Parses only: what an upload is told at once.
 * @param unit of the file's coordinates; bounds come in millimetres
 * @throws UnusableInput as `analyse` would for the same bytes
 */
export function inspect(bytes: Uint8Array, unit: MeshUnit = 'mm'): Inspection {
  const mmPerUnit = MM_PER_UNIT[unit];
  const raw = readMesh(bytes);
  checkCoordinates(raw.coords, mmPerUnit);
  const min: Point = [Infinity, Infinity, Infinity];
  const max: Point = [-Infinity, -Infinity, -Infinity];
  for (let i = 0; i < raw.coords.length; i += 3) {
    for (let k = 0; k < 3; k++) {
      const mm = raw.coords[i + k] * mmPerUnit;
      if (mm < min[k]) min[k] = mm;
      if (mm > max[k]) max[k] = mm;
    }
  }
  const scale = suggestScale(min.map((low, k) => max[k] - low));
  return {
    format: raw.format,
    triangles: raw.triangles,
    boundsMm: { min, max },
    warnings: scale === null ? raw.warnings : [...raw.warnings, 'suspicious_scale'],
  };
}
