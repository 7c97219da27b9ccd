import type { WebReport, WebRing } from '../report-forming';
import { say } from './basis';

/** Less length to gather than this share is lost in the sheet's own give (own judgement, no source). */
const NO_FOLD = 0.005;

/** Whether a ring folds by more than its figures mean. */
export function folds(ring: WebRing | null): ring is WebRing {
  return ring !== null && ring.webs && ring.limit - ring.hoopStretch > NO_FOLD;
}

/**
 * A message with the criterion of hoop against meridian stretch in a sentence: what the sheet must gather on its way to the
 * foot, and what it shortens by itself. As it was where nothing was reckoned, or nothing folds.
 */
export function withWeb(message: string, web: WebReport | null): string {
  if (!web) return message;
  return [
    message,
    ring(web.outside, 'round the template', 1),
    ring(web.neighbours, 'between the tightest neighbours', 2),
  ]
    .filter(Boolean)
    .join(' ');
}

/** @param sides of the gap that the sheet comes down on */
function ring(found: WebRing | null, where: string, sides: number): string {
  if (!folds(found)) return '';
  const { hoopStretch, limit, gapMm, gapThatHoldsMm } = found;
  const cure =
    gapThatHoldsMm === null
      ? ''
      : `; a gap of ${say(sides * gapThatHoldsMm)} mm instead of ${say(sides * gapMm)} mm would draw it smooth`;
  return `The sheet ${where} must gather to ${say(hoopStretch, 2)} of its length and shortens by itself only to ${say(limit, 2)}, so it may fold at the corners (derived, to be proven by a test pull)${cure}.`;
}
