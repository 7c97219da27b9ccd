import type { MapHistogram } from './stage-model-meta';

/** Area of the facets whose figure is below the limit, mm²; a bin that the limit cuts counts in proportion. */
export function areaBelow({ edges, areaMm2 }: MapHistogram, limit: number): number {
  return areaMm2.reduce((sum, area, i) => {
    const share = (limit - edges[i]) / (edges[i + 1] - edges[i]);
    return sum + area * Math.min(1, Math.max(0, share));
  }, 0);
}

export function areaAbove(histogram: MapHistogram, limit: number): number {
  return totalArea(histogram) - areaBelow(histogram, limit);
}

export function totalArea({ areaMm2 }: MapHistogram): number {
  return areaMm2.reduce((sum, area) => sum + area, 0);
}

/** Bin [a, b) that a figure falls into, the last one closed; the ends take what lies beyond them. */
export function binOf(edges: readonly number[], figure: number): number {
  let low = 0;
  let high = edges.length - 2;
  while (low < high) {
    const mid = (low + high + 1) >> 1;
    if (edges[mid] <= figure) low = mid;
    else high = mid - 1;
  }
  return low;
}
