/** A parallel view: where the eye stands, as seen from the target. */
export interface ParallelView {
  /** turn about the pull axis from the front (0°) towards the right side (90°) */
  azimuthDeg: number;
  /** height of the eye above the bed plane, -90..90 */
  elevationDeg: number;
}

/** True isometric from the front and the right (ISO 5456-3: the three axes are shortened alike). */
export const ISOMETRIC: ParallelView = { azimuthDeg: 45, elevationDeg: 35.264 };
export const ISOMETRIC_UNDER: ParallelView = { azimuthDeg: 45, elevationDeg: -35.264 };

export interface Raster {
  width: number;
  height: number;
  /** facet seen at each pixel, -1 where none is */
  facet: Int32Array;
  /** depth towards the eye in mm, greater is nearer */
  depth: Float32Array;
  pxPerMm: number;
}

export interface ViewAxes {
  right: [number, number, number];
  up: [number, number, number];
  /** from the target to the eye */
  toEye: [number, number, number];
}

export function viewAxes({ azimuthDeg, elevationDeg }: ParallelView): ViewAxes {
  const a = (azimuthDeg * Math.PI) / 180;
  const e = (elevationDeg * Math.PI) / 180;
  return {
    right: [Math.cos(a), Math.sin(a), 0],
    up: [-Math.sin(a) * Math.sin(e), Math.cos(a) * Math.sin(e), Math.cos(e)],
    toEye: [Math.sin(a) * Math.cos(e), -Math.cos(a) * Math.cos(e), Math.sin(e)],
  };
}

/** Depth-buffered facets of a triangle soup (nine numbers each, mm), fitted into the raster with a margin in pixels. */
export function rasterise(
  positions: Float32Array,
  view: ParallelView,
  width: number,
  height: number,
  margin: number,
): Raster {
  const { right, up, toEye } = viewAxes(view);
  const count = positions.length / 3;
  const sx = new Float32Array(count);
  const sy = new Float32Array(count);
  const sz = new Float32Array(count);
  let [x0, x1, y0, y1] = [Infinity, -Infinity, Infinity, -Infinity];
  for (let i = 0; i < count; i++) {
    const [x, y, z] = [positions[i * 3], positions[i * 3 + 1], positions[i * 3 + 2]];
    sx[i] = x * right[0] + y * right[1];
    sy[i] = x * up[0] + y * up[1] + z * up[2];
    sz[i] = x * toEye[0] + y * toEye[1] + z * toEye[2];
    x0 = Math.min(x0, sx[i]);
    x1 = Math.max(x1, sx[i]);
    y0 = Math.min(y0, sy[i]);
    y1 = Math.max(y1, sy[i]);
  }
  const scale = Math.min((width - 2 * margin) / (x1 - x0 || 1), (height - 2 * margin) / (y1 - y0 || 1));
  const [cx, cy] = [(x0 + x1) / 2, (y0 + y1) / 2];
  for (let i = 0; i < count; i++) {
    sx[i] = (sx[i] - cx) * scale + width / 2;
    sy[i] = height / 2 - (sy[i] - cy) * scale;
  }
  const facet = new Int32Array(width * height).fill(-1);
  const depth = new Float32Array(width * height).fill(-Infinity);
  for (let t = 0; t < count; t += 3) fill(t, sx, sy, sz, width, height, facet, depth);
  return { width, height, facet, depth, pxPerMm: scale };
}

function fill(
  t: number,
  sx: Float32Array,
  sy: Float32Array,
  sz: Float32Array,
  width: number,
  height: number,
  facet: Int32Array,
  depth: Float32Array,
): void {
  const [ax, ay, bx, by, cx, cy] = [sx[t], sy[t], sx[t + 1], sy[t + 1], sx[t + 2], sy[t + 2]];
  const area = (bx - ax) * (cy - ay) - (cx - ax) * (by - ay);
  // Facets that look away are hidden by the near side of a closed solid, but an open mesh shows its inside.
  if (area === 0) return;
  const left = Math.max(0, Math.ceil(Math.min(ax, bx, cx) - 0.5));
  const end = Math.min(width - 1, Math.floor(Math.max(ax, bx, cx) - 0.5));
  const top = Math.max(0, Math.ceil(Math.min(ay, by, cy) - 0.5));
  const low = Math.min(height - 1, Math.floor(Math.max(ay, by, cy) - 0.5));
  for (let y = top; y <= low; y++) {
    for (let x = left; x <= end; x++) {
      const px = x + 0.5;
      const py = y + 0.5;
      const u = ((px - ax) * (cy - ay) - (cx - ax) * (py - ay)) / area;
      const v = ((bx - ax) * (py - ay) - (px - ax) * (by - ay)) / area;
      if (u < 0 || v < 0 || u + v > 1) continue;
      const z = sz[t] + u * (sz[t + 1] - sz[t]) + v * (sz[t + 2] - sz[t]);
      const at = y * width + x;
      if (z > depth[at]) {
        depth[at] = z;
        facet[at] = t / 3;
      }
    }
  }
}
