import type { Membrane } from './membrane';

/** Shortening across, beyond what a freely drawn strip shows, that counts as a fold. */
const FOLD = 0.02;

/** What forming did to each element and node. */
export interface Stretches {
  /** Area as formed, mm². */
  area: Float64Array;
  /** Thickness of the sheet itself, mm; in a fold that of one layer, not of the pile. */
  thickness: Float64Array;
  /** 1 where hoop against meridian stretch says web: λ2 < λ1^−1/2 by more than 2 %. */
  folded: Uint8Array;
  /** Volume-true mean of the elements around each node, mm. */
  nodeThickness: Float64Array;
  formedArea: number;
  /** Sum of area × gauge / area ratio, mm³: the sheet's volume again, unless an element has collapsed. */
  volume: number;
}

/**
 * Thickness from the principal stretches λ1 ≥ λ2: gauge / (λ1 λ2) where the sheet is taut, gauge × λ1^−1/2 where it
 * has folded (uniaxial stretch of an incompressible sheet).
 */
export function measureElements(sheet: Membrane, gauge: number): Stretches {
  const { elements, nodes, corners } = sheet;
  const out: Stretches = {
    area: new Float64Array(elements),
    thickness: new Float64Array(elements),
    folded: new Uint8Array(elements),
    nodeThickness: new Float64Array(nodes),
    formedArea: 0,
    volume: 0,
  };
  const around = new Float64Array(nodes);
  for (let e = 0; e < elements; e++) {
    measureOne(sheet, e, gauge, out);
    const area = out.area[e];
    out.formedArea += area;
    for (let c = 3 * e; c < 3 * e + 3; c++) {
      around[corners[c]] += area;
      out.nodeThickness[corners[c]] += area * out.thickness[e];
    }
  }
  for (let n = 0; n < nodes; n++) out.nodeThickness[n] /= around[n];
  return out;
}

function measureOne({ corners, inverse, at }: Membrane, e: number, gauge: number, out: Stretches): void {
  const p = 3 * corners[3 * e];
  const q = 3 * corners[3 * e + 1];
  const r = 3 * corners[3 * e + 2];
  const ux = at[q] - at[p];
  const uy = at[q + 1] - at[p + 1];
  const uz = at[q + 2] - at[p + 2];
  const vx = at[r] - at[p];
  const vy = at[r + 1] - at[p + 1];
  const vz = at[r + 2] - at[p + 2];
  const a = inverse[4 * e];
  const b = inverse[4 * e + 1];
  const c = inverse[4 * e + 2];
  const d = inverse[4 * e + 3];
  const c11 = (ux * a + vx * c) ** 2 + (uy * a + vy * c) ** 2 + (uz * a + vz * c) ** 2;
  const c22 = (ux * b + vx * d) ** 2 + (uy * b + vy * d) ** 2 + (uz * b + vz * d) ** 2;
  const c12 =
    (ux * a + vx * c) * (ux * b + vx * d) +
    (uy * a + vy * c) * (uy * b + vy * d) +
    (uz * a + vz * c) * (uz * b + vz * d);
  const ratio = Math.sqrt(Math.max(0, c11 * c22 - c12 * c12));
  const largest = Math.sqrt((c11 + c22) / 2 + Math.sqrt(((c11 - c22) / 2) ** 2 + c12 * c12));
  const nx = uy * vz - uz * vy;
  const ny = uz * vx - ux * vz;
  const nz = ux * vy - uy * vx;
  out.area[e] = Math.sqrt(nx * nx + ny * ny + nz * nz) / 2;
  out.thickness[e] = gauge * Math.min(1 / ratio, 1 / Math.sqrt(largest));
  // λ2 √λ1 = ratio / √λ1; 1 in a strip drawn freely.
  out.folded[e] = ratio / Math.sqrt(largest) < 1 - FOLD ? 1 : 0;
  out.volume += (out.area[e] * gauge) / ratio;
}
