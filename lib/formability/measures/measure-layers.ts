import type { Facets } from '../mesh/measure-facets';
import { nubDraftDeg } from '../physics/layer-surface';
import type { LayersReport } from '../report';
import { DEG, VERTICAL_DEG } from './thresholds';

/** A facet flatter than this lies in a layer and has no steps. */
const FLAT_DEG = 89.5;
const BUCKETS = 20_000;

/**
 * Cusp = layer × |n_z| (A. Dolenc, I. Mäkelä, Computer-Aided Design 26 (1994) 119–126), tread = layer × tan(draft),
 * over non-bed facets with 0.25° < draft < 89.5°; the median is weighted by area. layerDraftDeg = atan(w/h) with w
 * the assumed groove between beads (derived: a nub clears the next bead once the wall has retreated by w).
 */
export function measureLayers(facets: Facets, layerMm: number, grooveMm: number): LayersReport {
  let slopes = known.get(facets);
  if (!slopes) known.set(facets, (slopes = measureSlopes(facets)));
  return {
    cuspMaxMm: layerMm * slopes.most,
    cuspMedianMm: layerMm * slopes.median,
    treadMinMm: slopes.least === null ? 0 : layerMm * Math.tan(Math.asin(slopes.least)),
    layerDraftDeg: nubDraftDeg(layerMm, grooveMm),
    show: null,
  };
}

/** n_z of the facets that have steps. */
interface Slopes {
  most: number;
  median: number;
  /** Null where no facet has steps. */
  least: number | null;
}

/** What no layer changes, for advice that tries several on one part. */
const known = new WeakMap<Facets, Slopes>();

function measureSlopes(facets: Facets): Slopes {
  const { area, nz, bed } = facets;
  const low = Math.sin(VERTICAL_DEG / DEG);
  const high = Math.sin(FLAT_DEG / DEG);
  const byNz = new Float64Array(BUCKETS + 1);
  let total = 0;
  let most = 0;
  let least = Infinity;
  for (let t = 0; t < area.length; t++) {
    const n = nz[t];
    if (bed[t] || !(n > low && n < high)) continue;
    byNz[(n * BUCKETS) | 0] += area[t];
    total += area[t];
    if (n > most) most = n;
    if (n < least) least = n;
  }
  let bucket = 0;
  let below = 0;
  while (total > 0 && below + byNz[bucket] < total / 2) below += byNz[bucket++];
  const within = total > 0 && byNz[bucket] > 0 ? medianIn(facets, low, high, bucket, total / 2 - below) : 0;
  return { most, median: within, least: total > 0 ? least : null };
}

/** The exact area-weighted median of n_z inside its bucket. */
function medianIn(facets: Facets, low: number, high: number, bucket: number, wanted: number): number {
  const found: { n: number; area: number }[] = [];
  const { area, nz, bed } = facets;
  for (let t = 0; t < area.length; t++) {
    const n = nz[t];
    if (bed[t] || !(n > low && n < high) || ((n * BUCKETS) | 0) !== bucket) continue;
    found.push({ n, area: area[t] });
  }
  found.sort((a, b) => a.n - b.n);
  let below = 0;
  for (const item of found) {
    below += item.area;
    if (below >= wanted) return item.n;
  }
  return found[found.length - 1].n;
}
