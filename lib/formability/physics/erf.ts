/**
 * Error function, relative error below 1e-14: its Maclaurin series near 0, the continued fraction of erfc beyond.
 * Source: M. Abramowitz, I. Stegun, Handbook of Mathematical Functions, 7.1.6 and 7.1.14.
 */
export function erf(x: number): number {
  return Math.abs(x) < SERIES_TO ? series(x) : Math.sign(x) * (1 - fraction(Math.abs(x)));
}

/** 1 − erf(x), without the loss of digits where erf is near 1. */
export function erfc(x: number): number {
  if (x < SERIES_TO) return x > -SERIES_TO ? 1 - series(x) : 2 - fraction(-x);
  return fraction(x);
}

const SERIES_TO = 1.5;

/** erf(x) = 2/√π e^(−x²) Σ 2ⁿ x^(2n+1) / (1·3·…·(2n+1)) */
function series(x: number): number {
  let term = x;
  let sum = x;
  for (let n = 1; Math.abs(term) > 1e-18 * Math.abs(sum) && n < 200; n++) {
    term *= (2 * x * x) / (2 * n + 1);
    sum += term;
  }
  return (2 / Math.sqrt(Math.PI)) * Math.exp(-x * x) * sum;
}

/** erfc(x) = e^(−x²)/√π · 1/(x + (1/2)/(x + 1/(x + (3/2)/(x + …)))), from the inside out. */
function fraction(x: number): number {
  let tail = x;
  for (let n = 120; n > 0; n--) tail = x + n / 2 / tail;
  return Math.exp(-x * x) / Math.sqrt(Math.PI) / tail;
}
