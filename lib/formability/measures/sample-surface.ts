import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import { CellTable } from './cell-table';

/** A point on a facet that speaks for an area round it. */
export interface Sample {
  facet: number;
  /** Place on the facet, as shares of its first and last side. */
  s: number;
  r: number;
  /** mm². */
  area: number;
}

export interface Sampling {
  samples: Sample[];
  /** Sample that speaks for each facet: its own, or that of its patch; −1 for facets left out. */
  ofFacet: Int32Array;
}

/** A facet larger than this share of a patch has samples of its own. */
const LARGE = 0.5;

/**
 * Points spread evenly over the chosen facets: many on a large facet; one for a patch of small ones, which are those in
 * a cube of space that look the same of six ways. A patch is spoken for by the facet nearest to its cube's middle, so
 * the choice hangs little on the order of facets.
 * @param wanted number of samples aimed at; there may be twice as many
 */
export function sampleSurface(mesh: Mesh, facets: Facets, chosen: Uint8Array, wanted: number): Sampling {
  const { index, position: p, triangles } = mesh;
  const { area, nx, ny, nz } = facets;
  const ofFacet = new Int32Array(triangles).fill(-1);
  let total = 0;
  for (let t = 0; t < triangles; t++) if (chosen[t]) total += area[t];
  const samples: Sample[] = [];
  if (!(total > 0)) return { samples, ofFacet };
  const patch = total / wanted;
  const scale = 1 / Math.sqrt(patch);
  const table = new CellTable();
  const nearest: number[] = [];
  let point = 0;
  // Facets in the list lie by one another: most are in the patch of the one before.
  let lastI = 0;
  let lastJ = 0;
  let lastK = 0;
  let last = -1;
  for (let t = 0; t < triangles; t++) {
    if (!chosen[t] || area[t] === 0) continue;
    if (area[t] > LARGE * patch) {
      const many = Math.ceil(area[t] / patch);
      ofFacet[t] = samples.length;
      for (let k = 0; k < many; k++) {
        // Even spread over the unit square (steps of 1/g, 1/g² with g³ = g + 1), folded into the facet.
        point++;
        const s = (point * 0.7548776662466927) % 1;
        const r = (point * 0.5698402909980532) % 1;
        const inside = s + r < 1;
        samples.push({ facet: t, s: inside ? s : 1 - s, r: inside ? r : 1 - r, area: area[t] / many });
        nearest.push(0);
      }
      continue;
    }
    const a = index[3 * t] * 3;
    const b = index[3 * t + 1] * 3;
    const d = index[3 * t + 2] * 3;
    const x = ((p[a] + p[b] + p[d]) / 3) * scale;
    const y = ((p[a + 1] + p[b + 1] + p[d + 1]) / 3) * scale;
    const z = ((p[a + 2] + p[b + 2] + p[d + 2]) / 3) * scale;
    const i = Math.floor(x);
    const j = Math.floor(y);
    const k = Math.floor(z);
    const ax = Math.abs(nx[t]);
    const ay = Math.abs(ny[t]);
    const az = Math.abs(nz[t]);
    const side =
      az >= ax && az >= ay ? (nz[t] > 0 ? 0 : 1) : ax >= ay ? (nx[t] > 0 ? 2 : 3) : ny[t] > 0 ? 4 : 5;
    const off = (x - i - 0.5) * (x - i - 0.5) + (y - j - 0.5) * (y - j - 0.5) + (z - k - 0.5) * (z - k - 0.5);
    const kept = 6 * k + side;
    const same = last >= 0 && i === lastI && j === lastJ && kept === lastK;
    const known = same ? last : table.find(i, j, kept, samples.length);
    ofFacet[t] = known;
    lastI = i;
    lastJ = j;
    lastK = kept;
    last = known;
    if (known === samples.length) {
      samples.push({ facet: t, s: 1 / 3, r: 1 / 3, area: area[t] });
      nearest.push(off);
      continue;
    }
    samples[known].area += area[t];
    if (off >= nearest[known]) continue;
    samples[known].facet = t;
    nearest[known] = off;
  }
  return { samples, ofFacet };
}
