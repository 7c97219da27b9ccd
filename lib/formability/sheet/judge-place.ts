import type { Point } from '../report';
import { heightAt, type Obstacle } from './obstacle';

/** Where on the template a point of the sheet lies. */
export type PlaceKind = 'flat' | 'wall' | 'inner-corner' | 'pit' | 'web';

const DIRECTIONS = 16;
/** Mean rise around, by the reach, from which a place counts as an inner corner, and as a pit. */
const CORNER = 0.1;
const PIT = 0.6;
/** A wider pit: as far as one looks for its walls, mm, in how many steps, and the rise by distance that makes one. */
const WIDE_MM = 15;
const WIDE_STEPS = 6;
const WALLED = 0.5;
/** Rise or fall by the reach from which a place without corner counts as wall. */
const STEEP = 0.5;

/**
 * Honest margin of thickness figures, percent: the spread between two laws of the free sheet, ±20 on walls and
 * ±30 in tight inner corners, pits and webs (own estimate from a numerical comparison; no experiment).
 */
export function marginPercent(kind: PlaceKind): number {
  return kind === 'flat' || kind === 'wall' ? 20 : 30;
}

/**
 * Looks at the template around a point. Rises and falls, each cut to the reach, cancel on a plain wall; what is left
 * over is a corner, and where nearly all sides rise, a pit.
 * @param reach how far, mm: the size of what counts as tight, and no less than the sheet's elements can tell
 */
export function judgePlace(template: Obstacle, [x, y, z]: Point, reach: number): PlaceKind {
  let sum = 0;
  let [highest, deepest] = [0, 0];
  for (let k = 0; k < DIRECTIONS; k++) {
    const angle = (2 * Math.PI * (k + 0.5)) / DIRECTIONS;
    const h = heightAt(template, x + reach * Math.cos(angle), y + reach * Math.sin(angle));
    const rise = Math.max(-1, Math.min(1, (h - z) / reach));
    sum += rise;
    highest = Math.max(highest, rise);
    deepest = Math.max(deepest, -rise);
  }
  const mean = sum / DIRECTIONS;
  if (mean > PIT || isWalledIn(template, [x, y, z], reach)) return 'pit';
  // A steep wall beside and a floor within reach below: a foot, however little it rises on the whole.
  if (mean > CORNER || (highest >= 1 && deepest < 1)) return 'inner-corner';
  return Math.max(highest, deepest) > STEEP ? 'wall' : 'flat';
}

/** Whether walls stand all round within 15 mm, half as high as they are far off at least: the floor of a deep pocket. */
function isWalledIn(template: Obstacle, [x, y, z]: Point, reach: number): boolean {
  const farthest = Math.max(WIDE_MM, reach);
  for (let k = 0; k < DIRECTIONS; k++) {
    const angle = (2 * Math.PI * (k + 0.5)) / DIRECTIONS;
    let walled = false;
    for (let s = 0; s <= WIDE_STEPS && !walled; s++) {
      const r = reach + ((farthest - reach) * s) / WIDE_STEPS;
      walled = heightAt(template, x + r * Math.cos(angle), y + r * Math.sin(angle)) - z > WALLED * r;
    }
    if (!walled) return false;
  }
  return true;
}
