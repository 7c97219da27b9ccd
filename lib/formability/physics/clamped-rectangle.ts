/** Even functions (1 − s²)² P₂ᵢ(s) of each direction. */
const TERMS = 9;
/** Gauss points: exact for the products of the basis. */
const POINTS = 32;

/**
 * Clamped rectangle under even pressure, shorter side a, longer side b = aspect · a: sag w D / q a⁴ at the middle and
 * moment |M| / q a² at the middle of the long side; at the middle of the plate the two curvatures, as κ D / q a².
 * Galerkin's method on (1−ξ²)²(1−η²)² P₂ᵢ(ξ) P₂ⱼ(η); agrees with S. Timoshenko, S. Woinowsky-Krieger, Theory of Plates
 * and Shells, Table 35. @throws RangeError for an aspect below 1
 */
export function clampedRectangle(aspect: number): ClampedRectangle {
  if (!(aspect >= 1 && Number.isFinite(aspect)))
    throw new RangeError(`a rectangle of aspect ${aspect}: give the longer over the shorter side, from 1 up`);
  const known = KNOWN.get(aspect);
  if (known) return known;
  if (KNOWN.size >= MOST_KNOWN) KNOWN.clear();
  const found = solveRectangle(aspect);
  KNOWN.set(aspect, found);
  return found;
}

export interface ClampedRectangle {
  sag: number;
  edgeMoment: number;
  /** Across the shorter and along the longer side; M = across + ν along. */
  centre: { across: number; along: number };
}

/** Solved once for each aspect: advice asks for the square of the infill again and again. */
const KNOWN = new Map<number, ClampedRectangle>();
const MOST_KNOWN = 64;

function solveRectangle(aspect: number): ClampedRectangle {
  const { stiff, mixed, mass, load, atMiddle, bentAtMiddle, curvatureAtRim } = basisIntegrals();
  const n = TERMS * TERMS;
  const matrix = new Float64Array(n * n);
  const right = new Float64Array(n);
  // Half sides 1 (across) and `aspect` (along): ∇⁴ = ∂⁴ξ + 2/r² ∂²ξ∂²η + 1/r⁴ ∂⁴η.
  const r2 = aspect * aspect;
  for (let i = 0; i < TERMS; i++) {
    for (let j = 0; j < TERMS; j++) {
      right[i * TERMS + j] = load[i] * load[j];
      for (let k = 0; k < TERMS; k++) {
        for (let l = 0; l < TERMS; l++) {
          matrix[(i * TERMS + j) * n + k * TERMS + l] =
            stiff[i][k] * mass[j][l] +
            (2 / r2) * mixed[i][k] * mixed[j][l] +
            (1 / (r2 * r2)) * mass[i][k] * stiff[j][l];
        }
      }
    }
  }
  const weight = solve(matrix, right);
  let sag = 0;
  let edge = 0;
  let [across, along] = [0, 0];
  for (let i = 0; i < TERMS; i++) {
    for (let j = 0; j < TERMS; j++) {
      sag += weight[i * TERMS + j] * atMiddle[i] * atMiddle[j];
      edge += weight[i * TERMS + j] * curvatureAtRim[i] * atMiddle[j];
      across -= weight[i * TERMS + j] * bentAtMiddle[i] * atMiddle[j];
      along -= weight[i * TERMS + j] * atMiddle[i] * bentAtMiddle[j];
    }
  }
  // From half-side units to the side: (a/2)⁴ and (a/2)².
  return {
    sag: sag / 16,
    edgeMoment: Math.abs(edge) / 4,
    centre: { across: across / 4, along: along / (4 * r2) },
  };
}

interface Integrals {
  stiff: number[][];
  mixed: number[][];
  mass: number[][];
  load: number[];
  atMiddle: number[];
  bentAtMiddle: number[];
  curvatureAtRim: number[];
}

function basisIntegrals(): Integrals {
  const square = () => Array.from({ length: TERMS }, () => new Array<number>(TERMS).fill(0));
  const out: Integrals = {
    stiff: square(),
    mixed: square(),
    mass: square(),
    load: new Array<number>(TERMS).fill(0),
    atMiddle: basisAt(0).value,
    bentAtMiddle: basisAt(0).second,
    curvatureAtRim: basisAt(1).second,
  };
  for (const { at, weight } of gaussPoints(POINTS)) {
    const { value, first, second } = basisAt(at);
    for (let i = 0; i < TERMS; i++) {
      out.load[i] += weight * value[i];
      for (let k = 0; k < TERMS; k++) {
        out.stiff[i][k] += weight * second[i] * second[k];
        out.mixed[i][k] += weight * first[i] * first[k];
        out.mass[i][k] += weight * value[i] * value[k];
      }
    }
  }
  return out;
}

/** Legendre polynomials up to a degree, with two derivatives. */
function legendre(degree: number, s: number): { p: number[]; d: number[]; dd: number[] } {
  const p = [1, s];
  const d = [0, 1];
  const dd = [0, 0];
  for (let k = 1; k < degree; k++) {
    p.push(((2 * k + 1) * s * p[k] - k * p[k - 1]) / (k + 1));
    d.push(d[k - 1] + (2 * k + 1) * p[k]);
    dd.push(dd[k - 1] + (2 * k + 1) * d[k]);
  }
  return { p, d, dd };
}

function basisAt(s: number): { value: number[]; first: number[]; second: number[] } {
  const { p, d, dd } = legendre(2 * TERMS, s);
  const g = (1 - s * s) ** 2;
  const g1 = -4 * s * (1 - s * s);
  const g2 = 12 * s * s - 4;
  const even = Array.from({ length: TERMS }, (_, i) => 2 * i);
  return {
    value: even.map((k) => g * p[k]),
    first: even.map((k) => g1 * p[k] + g * d[k]),
    second: even.map((k) => g2 * p[k] + 2 * g1 * d[k] + g * dd[k]),
  };
}

/** Roots and weights of Gauss–Legendre quadrature on −1…1, by Newton's method. */
function gaussPoints(n: number): { at: number; weight: number }[] {
  return Array.from({ length: n }, (_, i) => {
    let s = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    let slope = 1;
    for (let round = 0; round < 20; round++) {
      const { p, d } = legendre(n, s);
      slope = d[n];
      s -= p[n] / slope;
    }
    return { at: s, weight: 2 / ((1 - s * s) * slope * slope) };
  });
}

/** Cholesky's method for a symmetric, positive matrix. */
function solve(matrix: Float64Array, right: Float64Array): Float64Array {
  const n = right.length;
  for (let j = 0; j < n; j++) {
    for (let i = j; i < n; i++) {
      let sum = matrix[i * n + j];
      for (let k = 0; k < j; k++) sum -= matrix[i * n + k] * matrix[j * n + k];
      matrix[i * n + j] = i === j ? Math.sqrt(sum) : sum / matrix[j * n + j];
    }
  }
  const x = Float64Array.from(right);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < i; k++) x[i] -= matrix[i * n + k] * x[k];
    x[i] /= matrix[i * n + i];
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let k = i + 1; k < n; k++) x[i] -= matrix[k * n + i] * x[k];
    x[i] /= matrix[i * n + i];
  }
  return x;
}
