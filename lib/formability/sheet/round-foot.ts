import type { TemplateField } from './obstacle';

/** The ball is felt at points this far apart, in radii: far finer than the sheet's elements, which span one or two. */
const FEEL = 1 / 16;

/**
 * The template with a fillet along the bed: what a ball of that radius, rolled on the bed along the walls, cannot
 * reach is filled, as high as the ball touches. Walls and corners above stay as they are.
 * @param radiusMm of the ball
 */
export function roundFoot(field: TemplateField, radiusMm: number): TemplateField {
  const { cellMm: cell } = field;
  const pad = Math.ceil(radiusMm / cell) + 1;
  const { nx, ny, heights } = padded(field, pad);
  const ball = makeBall(radiusMm, cell);
  const near = nearTemplate(heights, nx, ny, pad);
  // Lowest middle of the ball over each cell, then the lowest that the ball's underside comes down to there.
  const middles = new Float64Array(heights.length).fill(radiusMm);
  for (let c = 0; c < heights.length; c++) {
    if (!near[c]) continue;
    for (let k = 0; k < ball.length; k++) {
      const o = neighbour(c, ball[k], nx, ny);
      if (o < 0) continue;
      const z = heights[o] + ball[k].rise;
      if (z > middles[c]) middles[c] = z;
    }
  }
  const rounded = Float64Array.from(heights);
  for (let c = 0; c < heights.length; c++) {
    if (!near[c] || heights[c] >= radiusMm) continue;
    let lowest = Infinity;
    for (let k = 0; k < ball.length; k++) {
      const o = neighbour(c, ball[k], nx, ny);
      lowest = Math.min(lowest, (o < 0 ? radiusMm : middles[o]) - ball[k].rise);
    }
    if (lowest > heights[c] && lowest <= radiusMm) rounded[c] = lowest;
  }
  const [originX, originY] = [field.originX - pad * cell, field.originY - pad * cell];
  return { cellMm: cell, nx, ny, originX, originY, heights: rounded };
}

interface Feel {
  dx: number;
  dy: number;
  /** How far the ball's underside lies above its lowest point, below its middle: √(R² − d²). */
  rise: number;
}

function makeBall(radiusMm: number, cell: number): Feel[] {
  const stride = Math.max(1, Math.round((FEEL * radiusMm) / cell));
  const most = Math.floor(radiusMm / (stride * cell));
  const ball: Feel[] = [];
  for (let j = -most; j <= most; j++) {
    for (let i = -most; i <= most; i++) {
      const square = radiusMm ** 2 - (stride * cell) ** 2 * (i * i + j * j);
      if (square >= 0) ball.push({ dx: stride * i, dy: stride * j, rise: Math.sqrt(square) });
    }
  }
  return ball;
}

function neighbour(c: number, { dx, dy }: Feel, nx: number, ny: number): number {
  const i = (c % nx) + dx;
  const j = Math.floor(c / nx) + dy;
  return i < 0 || j < 0 || i >= nx || j >= ny ? -1 : j * nx + i;
}

function padded({ nx, ny, heights }: TemplateField, pad: number) {
  const width = nx + 2 * pad;
  const out = new Float64Array(width * (ny + 2 * pad));
  for (let j = 0; j < ny; j++) out.set(heights.subarray(j * nx, (j + 1) * nx), (j + pad) * width + pad);
  return { nx: width, ny: ny + 2 * pad, heights: out };
}

/** Cells within a ball's reach of both the bed and the template; nothing happens elsewhere. */
function nearTemplate(heights: Float64Array, nx: number, ny: number, reach: number): Uint8Array {
  const solid = spread(heights, nx, ny, reach, (h) => h > 0);
  const bed = spread(heights, nx, ny, reach, (h) => h <= 0);
  return solid.map((one, c) => one & bed[c]);
}

/** Cells with one that holds within `reach` along x and y: two sweeps of a window. */
function spread(h: Float64Array, nx: number, ny: number, reach: number, holds: (h: number) => boolean) {
  const rows = new Uint8Array(h.length);
  const both = new Uint8Array(h.length);
  for (let j = 0; j < ny; j++) {
    let last = -Infinity;
    for (let i = 0; i < nx; i++) {
      if (holds(h[j * nx + i])) last = i;
      if (i - last <= reach) rows[j * nx + i] = 1;
    }
    last = Infinity;
    for (let i = nx - 1; i >= 0; i--) {
      if (holds(h[j * nx + i])) last = i;
      if (last - i <= reach) rows[j * nx + i] = 1;
    }
  }
  for (let i = 0; i < nx; i++) {
    let last = -Infinity;
    for (let j = 0; j < ny; j++) {
      if (rows[j * nx + i]) last = j;
      if (j - last <= reach) both[j * nx + i] = 1;
    }
    last = Infinity;
    for (let j = ny - 1; j >= 0; j--) {
      if (rows[j * nx + i]) last = j;
      if (last - j <= reach) both[j * nx + i] = 1;
    }
  }
  return both;
}
