import { suggestScale } from './mesh/suggest-scale';
import { checkCoordinates } from './parse/check-coordinates';
import { loadMesh, type LoadOptions } from './parse/load-mesh';
import type { RawMesh } from './parse/raw-mesh';
import { readMesh } from './parse/read-mesh';
import { MM_PER_UNIT, type MeshUnit } from './recipe';
import type { Inspection, Point } from './report';

/**
 * Parses only: what an upload is told at once. STL and 3MF; `inspectFile` also takes STEP.
 * @param unit of the file's coordinates where the format has none of its own; bounds come in millimetres
 * @throws UnusableInput as `analyse` would for the same bytes
 */
export function inspect(bytes: Uint8Array, unit: MeshUnit = 'mm'): Inspection {
  return describe(readMesh(bytes), unit);
}

/**
 * `inspect` for every format, a STEP file converted in a process of its own.
 * @throws UnusableInput as `inspect`; stopped, and what the conversion says
 */
export async function inspectFile(
  bytes: Uint8Array,
  unit: MeshUnit = 'mm',
  options: LoadOptions = {},
): Promise<Inspection> {
  return describe(await loadMesh(bytes, options), unit);
}

function describe(raw: RawMesh, given: MeshUnit): Inspection {
  const unit = raw.unit ?? given;
  const mmPerUnit = MM_PER_UNIT[unit];
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
    unit,
    triangles: raw.triangles,
    boundsMm: { min, max },
    warnings: scale === null ? raw.warnings : [...raw.warnings, 'suspicious_scale'],
  };
}
