import type { LoggedTemplate } from './pull-log';

/** Share that outlives a number of pulls, and the standard error of that share. */
export interface SurvivalStep {
  pulls: number;
  share: number;
  standardError: number;
}

/**
 * Kaplan and Meier's estimate with Greenwood's variance, a step at each number of pulls at which any failed; those put away
 * at that number still count as at risk. NIST/SEMATECH e-Handbook of Statistical Methods, chapter 8.
 */
export function survival(log: LoggedTemplate[]): SurvivalStep[] {
  const sorted = [...log].sort((a, b) => a.pulls - b.pulls);
  const steps: SurvivalStep[] = [];
  let share = 1;
  let sum = 0;
  for (let k = 0; k < sorted.length;) {
    const { pulls } = sorted[k];
    const atRisk = sorted.length - k;
    let failures = 0;
    for (; k < sorted.length && sorted[k].pulls === pulls; k++) if (sorted[k].failed) failures++;
    if (failures === 0) continue;
    share *= 1 - failures / atRisk;
    sum += failures / (atRisk * (atRisk - failures));
    steps.push({ pulls, share, standardError: share > 0 ? share * Math.sqrt(sum) : 0 });
  }
  return steps;
}

/**
 * Templates that must all come through to show a reliability at a confidence: ln(1 − C) / ln R, rounded up (success run).
 * @param reliability and @param confidence between 0 and 1
 */
export function successRun(reliability: number, confidence: number): number {
  for (const [name, value] of [
    ['reliability', reliability],
    ['confidence', confidence],
  ] as const)
    // prettier-ignore
    if (!(value > 0 && value < 1)) throw new RangeError(`${name} ${value}: give a share between 0 and 1`);
  return Math.ceil(Math.log(1 - confidence) / Math.log(reliability) - 1e-12);
}

/** The other way round: reliability that so many templates without a failure show, at a confidence. */
export function provenReliability(templates: number, confidence: number): number {
  return templates > 0 ? (1 - confidence) ** (1 / templates) : 0;
}

/**
 * Least mean life that a log shows at a confidence if templates fail at an even rate (exponential): total pulls over the
 * expected failures m with Poisson P(N ≤ failures | m) = 1 − confidence.
 */
export function meanAtLeast(totalPulls: number, failures: number, confidence: number): number {
  const chance = (m: number) => {
    let [term, sum] = [Math.exp(-m), 0];
    for (let k = 0; k <= failures; k++) {
      sum += term;
      term *= m / (k + 1);
    }
    return sum;
  };
  let [low, high] = [0, 10 * (failures + 10)];
  for (let round = 0; round < 100; round++) {
    const middle = (low + high) / 2;
    if (chance(middle) > 1 - confidence) low = middle;
    else high = middle;
  }
  return totalPulls / ((low + high) / 2);
}
