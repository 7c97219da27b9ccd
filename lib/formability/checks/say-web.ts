import type { WebReport, WebRing } from '../report-forming';
import { say } from './basis';

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
  if (!found?.webs) return '';
  const { hoopStretch, limit, gapMm, gapThatHoldsMm } = found;
  const cure =
    gapThatHoldsMm === null
      ? ''
      : `; a gap of ${say(sides * gapThatHoldsMm)} mm instead of ${say(sides * gapMm)} mm would draw it smooth`;
  return `The sheet ${where} must gather to ${say(hoopStretch, 2)} of its length and shortens by itself only to ${say(limit, 2)}, so it may fold at the corners (derived, to be proven by a test pull)${cure}.`;
}
