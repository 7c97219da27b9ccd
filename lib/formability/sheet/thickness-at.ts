import type { SheetSurface } from './sheet-surface';

/**
 * Thickness of the formed sheet over a place in plan, mm; NaN outside the frame. In the file's own x and y, z above the
 * bed: a figure of the survey, which lies about the mesh's middle, is moved by `prepared.mesh.centre` first.
 * Without z the uppermost sheet there is meant; with z the sheet nearest to that height, which tells wall from floor.
 */
export type ThicknessAt = (x: number, y: number, z?: number) => number;

/** Weight of lying beside a triangle against lying below another, where the uppermost sheet is meant. */
const UPPERMOST = 1e6;

/** Builds the sampler: triangles in square bins of the plan, and linear thickness inside each. */
export function makeThicknessAt(surface: SampledSurface): ThicknessAt {
  const sample = makeSheetSampler(surface);
  return (x, y, z = Infinity) => sample(x, y, z).thicknessMm;
}

/** What a sampler needs of a surface. */
export type SampledSurface = Pick<SheetSurface, 'nodes' | 'positions' | 'indices' | 'thicknessMm'>;

/** The sheet nearest to a place: its thickness there, and how far off it lies, mm. */
export interface SheetSample {
  thicknessMm: number;
  offMm: number;
}

/** The same with the distance, which tells a place that the sheet bridges from one that it touches. */
export function makeSheetSampler(surface: SampledSurface): (x: number, y: number, z: number) => SheetSample {
  const { positions: p, indices, thicknessMm } = surface;
  const triangles = indices.length / 3;
  const [nx, ny] = [surface.nodes[0] - 1, surface.nodes[1] - 1];
  const [x0, y0] = [p[0], p[1]];
  const last = p.length - 3;
  const [width, depth] = [p[last] - x0, p[last + 1] - y0];
  const column = (x: number) => Math.min(nx - 1, Math.max(0, Math.floor(((x - x0) / width) * nx)));
  const row = (y: number) => Math.min(ny - 1, Math.max(0, Math.floor(((y - y0) / depth) * ny)));
  const start = new Uint32Array(nx * ny + 1);
  const eachBin = (visit: (bin: number, t: number) => void) => {
    for (let t = 0; t < triangles; t++) {
      const [a, b, c] = [3 * indices[3 * t], 3 * indices[3 * t + 1], 3 * indices[3 * t + 2]];
      const right = column(Math.max(p[a], p[b], p[c]));
      const top = row(Math.max(p[a + 1], p[b + 1], p[c + 1]));
      for (let j = row(Math.min(p[a + 1], p[b + 1], p[c + 1])); j <= top; j++) {
        for (let i = column(Math.min(p[a], p[b], p[c])); i <= right; i++) visit(j * nx + i, t);
      }
    }
  };
  eachBin((bin) => start[bin + 1]++);
  for (let b = 0; b < nx * ny; b++) start[b + 1] += start[b];
  const next = start.slice();
  const listed = new Uint32Array(start[nx * ny]);
  eachBin((bin, t) => (listed[next[bin]++] = t));

  return (x, y, z) => {
    const edge = 1e-4 * Math.max(width, depth);
    if (!(x >= x0 - edge && x <= x0 + width + edge && y >= y0 - edge && y <= y0 + depth + edge))
      return { thicknessMm: NaN, offMm: NaN };
    let best = NaN;
    let least = Infinity;
    const look = (bin: number) => {
      for (let k = start[bin]; k < start[bin + 1]; k++) {
        const t = 3 * listed[k];
        const [i, j, l] = [indices[t], indices[t + 1], indices[t + 2]];
        const [u, v, w] = weights(p, 3 * i, 3 * j, 3 * l, x, y);
        // Cut to the triangle, so that a steep wall, a sliver in plan, is still the nearest at its height.
        const mix = (axis: number) => u * p[3 * i + axis] + v * p[3 * j + axis] + w * p[3 * l + axis];
        const off = (mix(0) - x) ** 2 + (mix(1) - y) ** 2;
        const far = z === Infinity ? off * UPPERMOST - mix(2) : off + (mix(2) - z) ** 2;
        if (far >= least) continue;
        least = far;
        best = u * thicknessMm[i] + v * thicknessMm[j] + w * thicknessMm[l];
      }
    };
    const [i, j] = [column(x), row(y)];
    // A wall may stand in the next bin, as far as the height field blurs it.
    const around = z === Infinity ? 0 : 1;
    for (let b = Math.max(0, j - around); b <= Math.min(ny - 1, j + around); b++) {
      for (let a = Math.max(0, i - around); a <= Math.min(nx - 1, i + around); a++) look(b * nx + a);
    }
    return { thicknessMm: best, offMm: z === Infinity ? 0 : Math.sqrt(least) };
  };
}

/** Barycentric weights in plan, cut to the triangle and summing to 1; equal ones for a triangle without plan area. */
function weights(p: Float32Array, a: number, b: number, c: number, x: number, y: number): number[] {
  const [ux, uy] = [p[b] - p[a], p[b + 1] - p[a + 1]];
  const [vx, vy] = [p[c] - p[a], p[c + 1] - p[a + 1]];
  const twice = ux * vy - uy * vx;
  if (Math.abs(twice) < 1e-12) return [1 / 3, 1 / 3, 1 / 3];
  const v = Math.max(0, ((x - p[a]) * vy - (y - p[a + 1]) * vx) / twice);
  const w = Math.max(0, (ux * (y - p[a + 1]) - uy * (x - p[a])) / twice);
  const u = Math.max(0, 1 - ((x - p[a]) * vy - (y - p[a + 1]) * vx) / twice - (ux * (y - p[a + 1]) - uy * (x - p[a])) / twice); // prettier-ignore
  const sum = u + v + w;
  return [u / sum, v / sum, w / sum];
}
