import type { Membrane } from './membrane';

/** Least squared area ratio that is computed with; an element flatter than this would divide by zero. */
const LEAST_DET = 1e-9;
/**
 * Forces on all nodes from the tension of the listed elements and from `pressure` on the upper side, in units of
 * μ t0 mm; `force` is overwritten.
 *
 * Incompressible neo-Hookean sheet in plane stress: W = μ/2 (tr C + 1/det C − 3), S = μ (I − C⁻¹/det C). Where it would
 * be in compression across (λ2 < λ1^−1/2) it wrinkles and the relaxed energy μ/2 (λ1² + 2/λ1 − 3) holds (tension field
 * theory: A. C. Pipkin, IMA J. Appl. Math. 36 (1986) 85–99, from memory).
 * @param active numbers of the elements with a free node, `count` of them
 * @param folded elements whose unit normal points down by more than this (0 to 1) carry no pressure
 */
export function addForces(
  sheet: Membrane,
  active: Int32Array,
  count: number,
  pressure: number,
  folded: number,
  force: Float64Array,
): void {
  const { corners, inverse, restArea, at } = sheet;
  force.fill(0);
  for (let k = 0; k < count; k++) {
    const e = active[k];
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
    // Columns of the deformation gradient F, and C = FᵀF.
    const fx = ux * a + vx * c;
    const fy = uy * a + vy * c;
    const fz = uz * a + vz * c;
    const gx = ux * b + vx * d;
    const gy = uy * b + vy * d;
    const gz = uz * b + vz * d;
    const c11 = fx * fx + fy * fy + fz * fz;
    const c12 = fx * gx + fy * gy + fz * gz;
    const c22 = gx * gx + gy * gy + gz * gz;
    let det = c11 * c22 - c12 * c12;
    if (!(det > LEAST_DET)) det = LEAST_DET;
    const half = (c11 + c22) / 2;
    const spread = Math.sqrt(((c11 - c22) / 2) * ((c11 - c22) / 2) + c12 * c12);
    const large = half + spread;
    let s11 = 0;
    let s12 = 0;
    let s22 = 0;
    // λ2² det C < 1 is the same as λ2 < λ1^−1/2; the lesser eigenvalue is taken from the product, which keeps its digits.
    if (det * det >= large) {
      const w = 1 / (det * det);
      s11 = 1 - c22 * w;
      s12 = c12 * w;
      s22 = 1 - c11 * w;
    } else if (large > 1) {
      const tension = (1 - 1 / (large * Math.sqrt(large))) / (2 * spread);
      // Projector on the greater principal direction: (C − λ2² I) / (λ1² − λ2²).
      const small = half - spread;
      s11 = tension * (c11 - small);
      s12 = tension * c12;
      s22 = tension * (c22 - small);
    }
    const area = restArea[e];
    const a1 = area * (s11 * a + s12 * b);
    const a2 = area * (s12 * a + s22 * b);
    const b1 = area * (s11 * c + s12 * d);
    const b2 = area * (s12 * c + s22 * d);
    const qx = fx * a1 + gx * a2;
    const qy = fy * a1 + gy * a2;
    const qz = fz * a1 + gz * a2;
    const rx = fx * b1 + gx * b2;
    const ry = fy * b1 + gy * b2;
    const rz = fz * b1 + gz * b2;
    let px = 0;
    let py = 0;
    let pz = 0;
    if (pressure !== 0) {
      px = uy * vz - uz * vy;
      py = uz * vx - ux * vz;
      pz = ux * vy - uy * vx;
      const open = pz >= 0 || pz * pz <= folded * folded * (px * px + py * py + pz * pz);
      const share = open ? -pressure / 6 : 0;
      px *= share;
      py *= share;
      pz *= share;
    }
    force[q] += px - qx;
    force[q + 1] += py - qy;
    force[q + 2] += pz - qz;
    force[r] += px - rx;
    force[r + 1] += py - ry;
    force[r + 2] += pz - rz;
    force[p] += px + qx + rx;
    force[p + 1] += py + qy + ry;
    force[p + 2] += pz + qz + rz;
  }
}

/** Lists the elements that still have a free node, in order; returns how many there are. */
export function listActive(sheet: Membrane, active: Int32Array): number {
  const { corners, free } = sheet;
  let count = 0;
  for (let e = 0, k = 0; e < sheet.elements; e++, k += 3) {
    if (free[corners[k]] | free[corners[k + 1]] | free[corners[k + 2]]) active[count++] = e;
  }
  return count;
}
