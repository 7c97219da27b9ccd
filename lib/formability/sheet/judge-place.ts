import type { Point } from '../report';
import { heightAt, type Obstacle } from './obstacle';

/** Where on the template a point of the sheet lies. */
export type PlaceKind = 'flat' | 'wall' | 'inner-corner' | 'pit' | 'web';

const DIRECTIONS = 16;

/**
 * Honest margin of thickness figures, percent: the spread between two laws of the free sheet, ±20 on walls and
 * ±30 in tight inner corners, pits and webs (own estimate from a numerical comparison; no experiment).
 */
export function marginPercent(kind: PlaceKind): number {
  return kind === 'flat' || kind === 'wall' ? 20 : 30;
}

/**
 * Looks at the template around a point: what rises (by half the reach or more) all round is a pit, what rises without
 * falling away at 45° is an inner corner.
 * @param reach how far, mm: the size of what counts as tight, and no less than the sheet's elements can tell
 */
export function judgePlace(template: Obstacle, [x, y, z]: Point, reach: number): PlaceKind {
  let rising = 0;
  let falling = 0;
  for (let k = 0; k < DIRECTIONS; k++) {
    const angle = (2 * Math.PI * (k + 0.5)) / DIRECTIONS;
    const h = heightAt(template, x + reach * Math.cos(angle), y + reach * Math.sin(angle));
    if (h - z > reach / 2) rising++;
    else if (z - h > reach) falling++;
  }
  if (rising === 0 && falling === 0) return 'flat';
  if (falling > 0) return 'wall';
  return rising >= DIRECTIONS - 4 ? 'pit' : 'inner-corner';
}
