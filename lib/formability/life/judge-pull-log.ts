import type { PullLogReport } from '../report-forming';
import { fitWeibull, weibullMean, weibullQuantile } from './fit-weibull';
import type { LoggedTemplate } from './pull-log';
import { meanAtLeast, provenReliability, survival } from './survival';

/** With fewer failures a fitted curve says more than is known (common practice, no source). */
const ENOUGH_FAILURES = 5;
const CONFIDENCE = 0.9;
/** Beyond this the bound is the mean. */
const MOST_COUNTED = 100;

/** What a studio's own log says of its templates' life. @param plannedPulls of the run that is asked about */
export function judgePullLog(log: LoggedTemplate[], plannedPulls: number): PullLogReport {
  const failures = log.filter((one) => one.failed).length;
  const pulls = log.reduce((sum, one) => sum + one.pulls, 0);
  const spread = new Set(log.filter((one) => one.failed).map((one) => one.pulls)).size > 1;
  const came = log.filter((one) => one.pulls >= plannedPulls).length;
  const fellShort = log.some((one) => one.failed && one.pulls < plannedPulls);
  return {
    templates: log.length,
    failures,
    survival: survival(log),
    weibull: failures >= ENOUGH_FAILURES && spread ? weibullOf(log) : null,
    meanBetweenPulls: failures > 0 ? pulls / failures : null,
    meanAtLeastPulls: failures < MOST_COUNTED ? meanAtLeast(pulls, failures, CONFIDENCE) : null,
    provenShare: fellShort ? null : provenReliability(came, CONFIDENCE),
  };
}

function weibullOf(log: LoggedTemplate[]): PullLogReport['weibull'] {
  const fit = fitWeibull(log);
  return { ...fit, b10Pulls: weibullQuantile(fit, 0.1), meanPulls: weibullMean(fit) };
}
