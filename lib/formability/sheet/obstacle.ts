import type { HeightField } from '../report';

/** A height field, vents closed; what the engine's grid gives, in float32 or float64. */
export type TemplateField = Omit<HeightField, 'heights'> & { heights: Float32Array | Float64Array };

/** The template as the sheet meets it: heights at cell centres with a ring of bed around them. */
export interface Obstacle {
  cell: number;
  /** Place of the ring's first centre. */
  x0: number;
  y0: number;
  width: number;
  depth: number;
  heights: Float64Array;
  highest: number;
  /** Plan box of what stands above the bed: least x and y, greatest x and y. */
  box: [number, number, number, number];
}

/** Heights below this are bed, mm. */
const BED_MM = 1e-6;
const HALVINGS = 40;

export function makeObstacle(field: TemplateField): Obstacle {
  const { cellMm: cell, nx, ny, originX, originY, heights } = field;
  const width = nx + 2;
  const padded = new Float64Array(width * (ny + 2));
  const box: Obstacle['box'] = [Infinity, Infinity, -Infinity, -Infinity];
  let highest = 0;
  for (let j = 0; j < ny; j++) {
    for (let i = 0; i < nx; i++) {
      const h = heights[j * nx + i];
      if (!(h > BED_MM)) continue;
      padded[(j + 1) * width + i + 1] = h;
      if (h > highest) highest = h;
      box[0] = Math.min(box[0], originX + i * cell);
      box[1] = Math.min(box[1], originY + j * cell);
      box[2] = Math.max(box[2], originX + (i + 1) * cell);
      box[3] = Math.max(box[3], originY + (j + 1) * cell);
    }
  }
  const x0 = originX - cell / 2;
  const y0 = originY - cell / 2;
  return { cell, x0, y0, width, depth: ny + 2, heights: padded, highest, box };
}

/** Height at a point, bilinear between cell centres; 0 off the field. */
export function heightAt(template: Obstacle, x: number, y: number): number {
  const { cell, width, depth, heights } = template;
  const u = (x - template.x0) / cell;
  const v = (y - template.y0) / cell;
  if (!(u >= 0 && v >= 0 && u < width - 1 && v < depth - 1)) return 0;
  const i = Math.floor(u);
  const j = Math.floor(v);
  const s = u - i;
  const t = v - j;
  const c = j * width + i;
  const low = heights[c] + s * (heights[c + 1] - heights[c]);
  const high = heights[c + width] + s * (heights[c + width + 1] - heights[c + width]);
  return low + t * (high - low);
}

/**
 * Share of a straight move at which a point above the template meets it, found by halving: the place lies on the
 * point's own path, just outside (put straight up or down instead, a point at a 5° wall would be 11 times as far off).
 * The end of the move must lie below the surface.
 */
export function meetAt(
  template: Obstacle,
  x: number,
  y: number,
  z: number,
  dx: number,
  dy: number,
  dz: number,
): number {
  let outside = 0;
  let inside = 1;
  for (let k = 0; k < HALVINGS && inside - outside > 1e-9; k++) {
    const middle = (outside + inside) / 2;
    if (z + middle * dz > heightAt(template, x + middle * dx, y + middle * dy)) outside = middle;
    else inside = middle;
  }
  return outside;
}
