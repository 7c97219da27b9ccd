import type { LoggedTemplate } from './pull-log';

export interface Weibull {
  shape: number;
  scalePulls: number;
  logLikelihood: number;
}

const [LEAST_SHAPE, MOST_SHAPE] = [0.01, 1000];

/**
 * Greatest likelihood with right censoring: Σ tᵏ ln t / Σ tᵏ − 1/k = (1/r) Σ_failed ln t, η = (Σ tᵏ / r)^(1/k). NIST/SEMATECH
 * e-Handbook of Statistical Methods, §8.4.1.3.
 * @throws RangeError without two failures at different numbers of pulls: the shape has no greatest likelihood then
 */
export function fitWeibull(log: LoggedTemplate[]): Weibull {
  const failed = log.filter((one) => one.failed);
  if (!log.every(({ pulls }) => pulls > 0)) throw new RangeError('a template has no pulls above 0');
  const longest = Math.max(...log.map((one) => one.pulls));
  if (failed.length < 2 || failed.every(({ pulls }) => pulls === longest))
    throw new RangeError('a Weibull shape needs two failures, one of them before the longest run');
  const meanLog = failed.reduce((sum, { pulls }) => sum + Math.log(pulls / longest), 0) / failed.length;
  // In shares of the longest run, so that no power overflows; the left side rises with the shape.
  const sums = (shape: number) => {
    let [powers, weighted] = [0, 0];
    for (const { pulls } of log) {
      const share = Math.log(pulls / longest);
      const power = Math.exp(shape * share);
      powers += power;
      weighted += power * share;
    }
    return { powers, balance: weighted / powers - 1 / shape - meanLog };
  };
  let [low, high] = [LEAST_SHAPE, MOST_SHAPE];
  for (let round = 0; round < 200 && high - low > 1e-13 * low; round++) {
    const middle = (low + high) / 2;
    if (sums(middle).balance > 0) high = middle;
    else low = middle;
  }
  const shape = (low + high) / 2;
  const scalePulls = longest * (sums(shape).powers / failed.length) ** (1 / shape);
  const logLikelihood =
    failed.reduce(
      (sum, { pulls }) => sum + Math.log(shape / scalePulls) + (shape - 1) * Math.log(pulls / scalePulls),
      0,
    ) - log.reduce((sum, { pulls }) => sum + (pulls / scalePulls) ** shape, 0);
  return { shape, scalePulls, logLikelihood };
}

/** Pulls that a share of templates outlives not: B10 for a share of 0.1. */
export function weibullQuantile({ shape, scalePulls }: Weibull, share: number): number {
  if (!(share > 0 && share < 1)) throw new RangeError(`share ${share}: give one between 0 and 1`);
  return scalePulls * (-Math.log(1 - share)) ** (1 / shape);
}

export function weibullMean({ shape, scalePulls }: Weibull): number {
  return scalePulls * gamma(1 + 1 / shape);
}

const LANCZOS = [
  0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
  12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
];

/** Γ(x) for x ≥ 1, to 14 digits. C. Lanczos, SIAM J. Numer. Anal. 1 (1964) 86, usual coefficients. */
function gamma(x: number): number {
  const z = x - 1;
  const t = z + 7.5;
  const sum = LANCZOS.reduce((total, c, i) => (i === 0 ? c : total + c / (z + i)), 0);
  return Math.sqrt(2 * Math.PI) * t ** (z + 0.5) * Math.exp(-t) * sum;
}
