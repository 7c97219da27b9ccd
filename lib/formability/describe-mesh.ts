import type { Columns } from './dexel/columns';
import { isBalanced } from './mesh/build-edges';
import { judgeShells } from './mesh/judge-shells';
import type { Facets } from './mesh/measure-facets';
import type { Placing } from './mesh/place-mesh';
import type { Prepared } from './mesh/prepare-mesh';
import { suggestScale } from './mesh/suggest-scale';
import { suggestUp } from './mesh/suggest-up';
import { warnPlacing } from './mesh/warn-placing';
import type { MeshReport } from './report';

/**
 * The mesh section: facts as stored, warnings with their places, and repairs.
 * @param undercutVolume mm³ of the part as it stands, which tells whether it lies on the wrong side
 */
export function describeMesh(
  prepared: Prepared,
  facets: Facets,
  columns: Columns,
  placing: Pick<Placing, 'up' | 'dropToBed'>,
  undercutVolume: number,
): MeshReport {
  const { facts, shells, min, max, edges } = prepared;
  const judged = judgeShells(prepared, columns);
  const standing = warnPlacing(prepared, placing);
  const warnings = new Set([...prepared.warnings, ...judged.warnings, ...standing.warnings]);
  const repairs = new Set([...prepared.repairs, ...standing.repairs]);
  if (columns.closedAtBed > 0) repairs.add('closed_at_bed');
  if (columns.filledColumns > 0) repairs.add('filled_columns');
  const suggestedScale = suggestScale(min.map((low, k) => max[k] - low));
  if (suggestedScale !== null) warnings.add('suspicious_scale');
  const suggestedUp = suggestUp(prepared, undercutVolume, columns.solidVolume);
  if (suggestedUp !== null) warnings.add('orientation');
  return {
    boundsMm: { min, max },
    volumeMm3: facts.volume,
    unionVolumeMm3: judged.unionVolumeMm3,
    areaMm2: facets.totalArea,
    bedContactAreaMm2: facets.bedArea,
    shells: shells.count,
    watertight: facts.watertight,
    edges: facts.edges,
    degenerate: facts.degenerate,
    duplicates: facts.duplicates,
    suggestedScale,
    suggestedUp,
    openColumns: columns.openColumns,
    approximate: !isBalanced(edges),
    warnings: [...warnings].sort(),
    repairs: [...repairs].sort(),
    places: [...prepared.places, ...standing.places, ...judged.places],
  };
}
