import { DISC_MM } from './find-thinnest';
import type { Obstacle } from './obstacle';

/** The band along the bed round the template, in which the sheet runs from the wall into the flange. */
export interface Foot {
  /** How high it reaches above the bed, mm. */
  heightMm: number;
  /** Whether a point of the sheet lies in it. */
  holds(x: number, y: number, z: number): boolean;
}

/** Share of the template's height that the foot takes at most. */
const MOST_SHARE = 1 / 3;
/** Cells by which the height field blurs an upright wall. */
const BLUR = 1;

/**
 * The foot: bed level outside, as the frame's edge reaches it without climbing higher than the disc that thickness is
 * meant over. A part is trimmed at or above it, so what the sheet thins to there concerns only a part that keeps its
 * flange (common practice, no source). Bed level that the template encloses, such as a hole, belongs to the part.
 */
export function findFoot(template: Obstacle): Foot {
  const heightMm = Math.min(DISC_MM, MOST_SHARE * template.highest);
  const outside = floodFromEdge(template, heightMm);
  const { cell, x0, y0, width, depth } = template;
  const holds = (x: number, y: number, z: number) => {
    if (z > heightMm) return false;
    const i = Math.round((x - x0) / cell);
    const j = Math.round((y - y0) / cell);
    for (let row = j - BLUR; row <= j + BLUR; row++) {
      for (let column = i - BLUR; column <= i + BLUR; column++) {
        if (row < 0 || column < 0 || row >= depth || column >= width) return true;
        if (outside[row * width + column]) return true;
      }
    }
    return false;
  };
  return { heightMm, holds };
}

/** Cells no higher than a level that hang together with the ring of bed round the field. */
function floodFromEdge({ width, depth, heights }: Obstacle, level: number): Uint8Array {
  const reached = new Uint8Array(heights.length);
  const stack = new Int32Array(heights.length);
  let end = 0;
  const visit = (c: number) => {
    if (reached[c] || heights[c] > level) return;
    reached[c] = 1;
    stack[end++] = c;
  };
  visit(0);
  while (end > 0) {
    const c = stack[--end];
    const i = c % width;
    if (i > 0) visit(c - 1);
    if (i < width - 1) visit(c + 1);
    if (c >= width) visit(c - width);
    if (c < width * (depth - 1)) visit(c + width);
  }
  return reached;
}
