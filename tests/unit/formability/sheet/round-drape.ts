/** A ring of the sheet as formed. */
export interface Ring {
  r: number;
  z: number;
  thickness: number;
}

interface RoundInput {
  clampRadius: number;
  height: number;
  profile(r: number): number;
  rings?: number;
}

const LOWER = 60;
const PER_STEP = 40;
const GROWTH = 1.1;

/**
 * The same forming in one dimension: a round sheet of rings, clamped at its rim, lowered over a round template given by
 * a formula, pressed on, sticking where it touches. Written apart from the solver under test: rings instead of
 * triangles, stretches along and around instead of a tensor, a tridiagonal preconditioner instead of multigrid.
 */
export function drapeRound({ clampRadius, height, profile, rings = 300 }: RoundInput): Ring[] {
  const n = rings;
  const step = clampRadius / n;
  const r = Float64Array.from({ length: n + 1 }, (_, k) => k * step);
  const z = new Float64Array(n + 1).fill(height);
  const free = new Uint8Array(n + 1).fill(1);
  free[n] = 0;
  for (let k = 0; k < n; k++) if (profile(r[k]) >= height - 1e-9) free[k] = 0;
  const [fr, fz, vr, vz, diagonal, sr, sz] = Array.from({ length: 7 }, () => new Float64Array(n + 1));
  const middle = (k: number) => (k + 0.5) * step;

  const forces = (pressure: number) => {
    fr.fill(0);
    fz.fill(0);
    for (let k = 0; k < n; k++) {
      const [dr, dz] = [r[k + 1] - r[k], z[k + 1] - z[k]];
      const length = Math.sqrt(dr * dr + dz * dz);
      const along = length / step;
      const around = (r[k] + r[k + 1]) / 2 / middle(k);
      const [sAlong, sAround] = stress(along, around);
      const area = 2 * Math.PI * middle(k) * step;
      const pull = (area * sAlong) / step / length;
      const hoop = (area * sAround) / middle(k) / 2;
      const press = Math.PI * (r[k] + r[k + 1]) * (pressure / 2);
      // Downward and, on a falling meridian, inward normal.
      fr[k] += pull * dr - hoop + press * dz;
      fr[k + 1] += -pull * dr - hoop + press * dz;
      fz[k] += pull * dz - press * dr;
      fz[k + 1] += -pull * dz - press * dr;
    }
    fr[0] = 0;
  };
  /** Solves the linear string of rings for one component, fixed where stuck (Thomas' algorithm). */
  const solve = (f: Float64Array, out: Float64Array, own: boolean) => {
    const link = (k: number) => (2 * Math.PI * middle(k)) / step;
    for (let k = 0; k <= n; k++) {
      if (!free[k] || (own && k === 0)) {
        diagonal[k] = 1;
        out[k] = 0;
        continue;
      }
      const joined = k > 0 && free[k - 1] && !(own && k === 1) ? link(k - 1) : 0;
      const around = own ? (2 * Math.PI * step) / Math.max(k * step, step) : 0;
      diagonal[k] = (k > 0 ? link(k - 1) : 0) + link(k) + around;
      out[k] = f[k];
      if (joined) {
        const share = joined / diagonal[k - 1];
        diagonal[k] -= share * joined;
        out[k] += share * out[k - 1];
      }
    }
    for (let k = n; k >= 0; k--) {
      if (!free[k]) continue;
      if (k < n && free[k + 1]) out[k] += link(k) * out[k + 1];
      out[k] /= diagonal[k];
    }
    if (own) out[0] = 0;
  };
  const iterate = (pressure: number) => {
    forces(pressure);
    solve(fr, sr, true);
    solve(fz, sz, false);
    for (let k = 0; k <= n; k++) {
      if (!free[k]) continue;
      vr[k] = 0.5 * vr[k] + 0.3 * sr[k];
      vz[k] = 0.5 * vz[k] + 0.3 * sz[k];
      const length = Math.sqrt(vr[k] ** 2 + vz[k] ** 2);
      const cap = length > step / 2 ? step / 2 / length : 1;
      const [dr, dz] = [cap * vr[k], cap * vz[k]];
      let share = 1;
      if (z[k] + dz <= profile(r[k] + dr)) {
        let [above, below] = [0, 1];
        for (let i = 0; i < 40; i++) {
          const half = (above + below) / 2;
          if (z[k] + half * dz > profile(r[k] + half * dr)) above = half;
          else below = half;
        }
        share = above;
        free[k] = 0;
        vr[k] = vz[k] = 0;
      }
      r[k] += share * dr;
      z[k] += share * dz;
    }
  };
  for (let s = 1; s <= LOWER; s++) {
    z[n] = height * (1 - s / LOWER);
    for (let k = 0; k < PER_STEP; k++) iterate(0);
  }
  for (let p = 0.3 / clampRadius; p < 0.5 / step && free.some((one) => one === 1); p *= GROWTH) {
    for (let k = 0; k < PER_STEP; k++) iterate(p);
  }
  return Array.from({ length: n }, (_, k) => {
    const along = Math.hypot(r[k + 1] - r[k], z[k + 1] - z[k]) / step;
    const around = (r[k] + r[k + 1]) / 2 / middle(k);
    return { r: (r[k] + r[k + 1]) / 2, z: (z[k] + z[k + 1]) / 2, thickness: 1 / (along * around) };
  });
}

/** dW/dλ along and around (μ = 1), with the relaxed energy where one direction is slack. */
function stress(along: number, around: number): [number, number] {
  if (around < along ** -0.5) return [Math.max(0, along - along ** -2), 0];
  if (along < around ** -0.5) return [0, Math.max(0, around - around ** -2)];
  const w = 1 / (along * around) ** 2;
  return [along - w / along, around - w / around];
}
