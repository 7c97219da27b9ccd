import type { Hits } from './raster';

/** Hits of facets numbered `from` and above keep their side but lose their number: they belong to caps of holes. */
export function forgetFacets(hits: Hits, from: number): void {
  const { start, count, code } = hits;
  for (let c = 0; c < count.length; c++) {
    for (let i = start[c]; i < start[c] + count[c]; i++) {
      if (code[i] >> 1 >= from) code[i] = code[i] & 1 ? -1 : -2;
    }
  }
}
