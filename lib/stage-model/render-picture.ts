import { cividis, type Rgb } from './cividis';
import { draftScaleAt, draftScaleMaxDeg, FLAT_FROM_DEG } from './draft-scale';
import { encodePng } from './encode-png';
import { CLAY_DARK, CLAY_LIGHT, INK, MADDER, mix, PAPER } from './picture-palette';
import { ISOMETRIC, rasterise, viewAxes, type ParallelView, type Raster, type ViewAxes } from './rasterise';
import { FLAG_BED, FLAG_UNDERCUT, type StageGeometry } from './stage-model-meta';

export interface PictureOptions {
  widthPx?: number;
  heightPx?: number;
  /** plain clay, or walls in the colours of the draft map */
  map?: 'plain' | 'draft';
  /** drafts below this are hatched on the draft map */
  limitDeg?: number;
  view?: ParallelView;
}

export const PICTURE_SIZE = { widthPx: 1200, heightPx: 800 };
export const THUMBNAIL_SIZE = { widthPx: 320, heightPx: 240 };
/** Each pixel is the mean of this many samples each way. */
const SAMPLES = 2;
/** Facets seen side by side whose normals part by more than this are divided by an ink line. */
const EDGE_COS = Math.cos((32 * Math.PI) / 180);

/**
 * A still picture of the template as PNG, for lists, documents and browsers without WebGL; the same input gives the
 * same bytes. Undercut faces are hatched in madder on every map. Throws RangeError on an empty mesh.
 */
export function renderPicture(geometry: StageGeometry, options: PictureOptions = {}): Uint8Array {
  const { widthPx, heightPx, map, limitDeg, view } = {
    ...PICTURE_SIZE,
    map: 'plain' as const,
    limitDeg: 5,
    view: ISOMETRIC,
    ...options,
  };
  if (geometry.positions.length === 0)
    throw new RangeError('The mesh has no triangle; there is nothing to picture.');
  const margin = Math.round(Math.min(widthPx, heightPx) * 0.05) * SAMPLES;
  const raster = rasterise(geometry.positions, view, widthPx * SAMPLES, heightPx * SAMPLES, margin);
  const axes = viewAxes(view);
  const normals = seenNormals(geometry.positions, raster);
  const paint = (at: number, facet: number): Rgb => {
    const normal = normals.subarray(facet * 3, facet * 3 + 3);
    const undercut = (geometry.facetFlags[facet] & FLAG_UNDERCUT) !== 0;
    const x = at % raster.width;
    const y = Math.floor(at / raster.width);
    const stripe = hatched(x, y, heightPx);
    if (undercut && stripe) return MADDER;
    const draft = geometry.facetDraftDeg[facet];
    const isWall = draft < FLAT_FROM_DEG && (geometry.facetFlags[facet] & FLAG_BED) === 0;
    if (map === 'plain' || !isWall) return clay(normal, axes);
    const colour = cividis(draftScaleAt(draft, draftScaleMaxDeg(limitDeg)));
    return draft < limitDeg && stripe ? mix(colour, PAPER, 0.75) : colour;
  };
  return encodePng(resolve(raster, normals, paint, widthPx, heightPx), widthPx, heightPx);
}

/** Means of the samples; a sample on an edge is drawn over with ink. */
function resolve(
  raster: Raster,
  normals: Float32Array,
  paint: (at: number, facet: number) => Rgb,
  widthPx: number,
  heightPx: number,
): Uint8Array {
  const ink = inkLines(raster, normals);
  const rgb = new Uint8Array(widthPx * heightPx * 3);
  const sum = [0, 0, 0];
  for (let y = 0; y < heightPx; y++) {
    for (let x = 0; x < widthPx; x++) {
      sum.fill(0);
      for (let s = 0; s < SAMPLES * SAMPLES; s++) {
        const at = (y * SAMPLES + Math.floor(s / SAMPLES)) * raster.width + x * SAMPLES + (s % SAMPLES);
        const facet = raster.facet[at];
        const base = facet < 0 ? PAPER : paint(at, facet);
        const colour = ink[at] ? mix(base, INK, ink[at] / 255) : base;
        for (let c = 0; c < 3; c++) sum[c] += colour[c];
      }
      for (let c = 0; c < 3; c++) rgb[(y * widthPx + x) * 3 + c] = Math.round(sum[c] / (SAMPLES * SAMPLES));
    }
  }
  return rgb;
}

const CREASE = 110;

/** Strength of the ink at each sample: outlines and steps in depth full, creases lighter. */
function inkLines(raster: Raster, normals: Float32Array): Uint8Array {
  const { width, height, facet, depth, pxPerMm } = raster;
  const ink = new Uint8Array(width * height);
  const mark = (a: number, b: number) => {
    const [f, g] = [facet[a], facet[b]];
    if (f === g) return;
    let strength = 0;
    if (f < 0 || g < 0) strength = 235;
    else {
      const n = f * 3;
      const m = g * 3;
      const dot = normals[n] * normals[m] + normals[n + 1] * normals[m + 1] + normals[n + 2] * normals[m + 2];
      if (Math.abs(depth[a] - depth[b]) * pxPerMm > 8) strength = 200;
      else if (dot < EDGE_COS) strength = CREASE;
    }
    // The nearer side carries the line, so that it lies on the body and not on what is behind it.
    const on = depth[a] >= depth[b] ? a : b;
    ink[on] = Math.max(ink[on], strength);
    // Two samples, one pixel, wide: creases lie on both faces, outlines wholly on the body.
    const second = strength === CREASE ? a + b - on : on === a ? a - (b - a) : b + (b - a);
    if (second >= 0 && second < ink.length && facet[second] >= 0)
      ink[second] = Math.max(ink[second], strength);
  };
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      const at = y * width + x;
      if (x + 1 < width) mark(at, at + 1);
      if (y + 1 < height) mark(at, at + width);
    }
  }
  return ink;
}

/** Unit normals of the facets that are seen (others stay 0). */
function seenNormals(p: Float32Array, raster: Raster): Float32Array {
  const normals = new Float32Array(p.length / 3);
  for (const f of raster.facet) {
    if (f < 0 || normals[f * 3] !== 0 || normals[f * 3 + 1] !== 0 || normals[f * 3 + 2] !== 0) continue;
    const i = f * 9;
    const [ux, uy, uz] = [p[i + 3] - p[i], p[i + 4] - p[i + 1], p[i + 5] - p[i + 2]];
    const [vx, vy, vz] = [p[i + 6] - p[i], p[i + 7] - p[i + 1], p[i + 8] - p[i + 2]];
    const [x, y, z] = [uy * vz - uz * vy, uz * vx - ux * vz, ux * vy - uy * vx];
    const length = Math.hypot(x, y, z) || 1;
    normals.set([x / length, y / length, z / length], f * 3);
  }
  return normals;
}

/** Soft light from above and the left of the eye: tops lightest, walls by how far they turn away. */
function clay(normal: Float32Array, { right, toEye }: ViewAxes): Rgb {
  const side = normal[0] * right[0] + normal[1] * right[1] + normal[2] * right[2];
  const facing = Math.abs(normal[0] * toEye[0] + normal[1] * toEye[1] + normal[2] * toEye[2]);
  const light = 0.3 + 0.4 * Math.max(0, normal[2]) + 0.22 * facing - 0.24 * side;
  return mix(CLAY_DARK, CLAY_LIGHT, Math.min(1, Math.max(0, light)));
}

/** Rising strokes, as hatching is drawn; their pitch follows the size of the picture. */
function hatched(x: number, y: number, heightPx: number): boolean {
  const pitch = Math.max(4, Math.round(heightPx / 100)) * SAMPLES;
  return (x + y) % pitch < pitch * 0.3;
}
