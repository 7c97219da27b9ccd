import type { Columns } from './dexel/columns';
import type { Facets } from './mesh/measure-facets';
import type { Prepared } from './mesh/prepare-mesh';
import { signedVolume } from './mesh/signed-volume';
import { suggestScale } from './mesh/suggest-scale';
import { warnPlacing } from './mesh/warn-placing';
import type { MeshReport } from './report';

/** Fewer columns than this share that look doubly covered are grazing noise. */
const STRAY_COLUMNS = 1e-4;

/**
 * The mesh section: facts as stored, warnings and repairs. The union volume is the signed volume after repair less
 * what the columns see covered more than once, so it has no grid error where nothing overlaps.
 */
export function describeMesh(prepared: Prepared, facets: Facets, columns: Columns): MeshReport {
  const { mesh, facts, shells, min, max } = prepared;
  const warnings = new Set(prepared.warnings);
  const repairs = new Set(prepared.repairs);
  const placing = warnPlacing(prepared, facets);
  for (const warning of placing.warnings) warnings.add(warning);
  const covered = columns.count.reduce((sum, n) => sum + (n > 0 ? 1 : 0), 0);
  const many = Math.max(2, STRAY_COLUMNS * covered);
  const overlaps = columns.overlapColumns > many;
  if (overlaps) warnings.add(shells.count > 1 ? 'overlapping_shells' : 'self_intersection');
  if (columns.touchingColumns > many) warnings.add('touching_shells');
  if (columns.closedAtBed > 0) repairs.add('closed_at_bed');
  if (columns.filledColumns > 0) repairs.add('filled_columns');
  const suggestedScale = suggestScale(min.map((low, k) => max[k] - low));
  if (suggestedScale !== null) warnings.add('suspicious_scale');
  const sound = columns.openColumns === 0 && min[2] >= 0;
  const union = sound
    ? signedVolume(mesh, 0, 0) - (overlaps ? columns.excessVolume : 0)
    : columns.solidVolume;
  return {
    boundsMm: { min, max },
    volumeMm3: facts.volume,
    unionVolumeMm3: union,
    areaMm2: facets.totalArea,
    bedContactAreaMm2: facets.bedArea,
    shells: shells.count,
    watertight: facts.watertight,
    edges: facts.edges,
    degenerate: facts.degenerate,
    duplicates: facts.duplicates,
    suggestedScale,
    suggestedUp: placing.suggestedUp,
    openColumns: columns.openColumns,
    warnings: [...warnings].sort(),
    repairs: [...repairs].sort(),
  };
}
