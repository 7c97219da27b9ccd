import type { SheetZone } from '../report-sheet';
import type { SheetJudgement } from './judge-sheet';

/** A judgement with another gauge: in this model every thickness goes with it. The area below the limit is left as it was. */
export function scaleSheet(judged: SheetJudgement, share: number): SheetJudgement {
  if (!judged.formed) return judged;
  const { report } = judged.formed;
  const zone = (one: SheetZone | null) =>
    one && { ...one, minMm: one.minMm * share, q05Mm: one.q05Mm * share };
  return {
    ...judged,
    remedy: null,
    footRemedy: null,
    formed: {
      ...judged.formed,
      report: {
        ...report,
        minMm: report.minMm * share,
        meanMm: report.meanMm * share,
        q01Mm: report.q01Mm * share,
        q05Mm: report.q05Mm * share,
        part: zone(report.part),
        foot: zone(report.foot),
      },
    },
  };
}
