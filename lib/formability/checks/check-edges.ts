import type { Check } from '../report';
import { basisOf, say } from './basis';
import type { CheckInput } from './check-input';

/** Are edges and inside corners rounder than the sheet needs? */
export function checkEdges({ recipe, report }: CheckInput): Check {
  const limit = recipe.limits.edgeRadiusGauges * recipe.sheet.gaugeMm;
  const { edges } = report;
  const radii = [edges.minConvexRadiusMm, edges.minConcaveRadiusMm].filter((r): r is number => r !== null);
  const measured = radii.length > 0 ? Math.min(...radii) : null;
  const sharp = edges.sharpConvexMm + edges.sharpConcaveMm;
  const small = measured !== null && measured < limit - 1e-9;
  return {
    id: 'edges',
    status: small ? 'caution' : 'pass',
    measured,
    limit,
    unit: 'mm',
    basis: basisOf('edgeRadiusGauges', recipe),
    message: small
      ? sharp > 0
        ? `${[edges.sharpConvexMm > 0 ? `${say(edges.sharpConvexMm, 0)} mm of edges` : '', edges.sharpConcaveMm > 0 ? `${say(edges.sharpConcaveMm, 0)} mm of inside corners` : ''].filter(Boolean).join(' and ')} are sharp; the ${say(recipe.sheet.gaugeMm, 2)} mm sheet thins over them and does not fill them.`
        : `The tightest rounding has a radius of ${say(measured, 2)} mm, less than the sheet is thick.`
      : 'Edges and inside corners are round enough for this sheet.',
    remedy: small ? `Round edges and inside corners with a radius of at least ${say(limit, 2)} mm; 1.5 gauges (${say(1.5 * recipe.sheet.gaugeMm, 2)} mm) is better.` : '', // prettier-ignore
    places: small ? edges.places : [],
  };
}
