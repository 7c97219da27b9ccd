import type { StageGeometry } from '@/lib/stage-model/stage-model-meta';

/** Test solids as triangle soups with outward facets, mm, base at z = 0; sizes and drafts are invented. */
export type Point = [number, number, number];

/** Facet draft (asin n_z) and flags of a soup, by the definitions of the engine's contract. */
export function geometryOf(positions: Float32Array): StageGeometry {
  const facets = positions.length / 9;
  const facetDraftDeg = new Float32Array(facets);
  const facetFlags = new Uint8Array(facets);
  for (let f = 0; f < facets; f++) {
    const p = (k: number) => positions.subarray(f * 9 + k * 3, f * 9 + k * 3 + 3);
    const [a, b, c] = [p(0), p(1), p(2)];
    const u = [b[0] - a[0], b[1] - a[1], b[2] - a[2]];
    const v = [c[0] - a[0], c[1] - a[1], c[2] - a[2]];
    const n = [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]];
    const nz = n[2] / (Math.hypot(...n) || 1);
    facetDraftDeg[f] = (Math.asin(nz) * 180) / Math.PI;
    if (nz < 0 && a[2] <= 1e-4 && b[2] <= 1e-4 && c[2] <= 1e-4) facetFlags[f] = 1;
    else if (facetDraftDeg[f] < -0.25) facetFlags[f] = 2;
  }
  return { positions, facetDraftDeg, facetFlags };
}

export class Soup {
  readonly values: number[] = [];
  tri(a: Point, b: Point, c: Point): this {
    this.values.push(...a, ...b, ...c);
    return this;
  }
  quad(a: Point, b: Point, c: Point, d: Point): this {
    return this.tri(a, b, c).tri(a, c, d);
  }
  /** Joins two rings of equal length, the lower one first, both counter-clockwise seen from above, outward. */
  band(low: Point[], high: Point[]): this {
    for (let i = 0; i < low.length; i++) {
      const j = (i + 1) % low.length;
      this.quad(low[i], low[j], high[j], high[i]);
    }
    return this;
  }
  cap(ring: Point[], centre: Point, up: boolean): this {
    for (let i = 0; i < ring.length; i++) {
      const j = (i + 1) % ring.length;
      if (up) this.tri(centre, ring[i], ring[j]);
      else this.tri(centre, ring[j], ring[i]);
    }
    return this;
  }
  done(): Float32Array {
    return Float32Array.from(this.values);
  }
}

export function rectangle(w: number, d: number, z: number, x = 0, y = 0): Point[] {
  const [a, b] = [w / 2, d / 2];
  return [
    [x - a, y - b, z],
    [x + a, y - b, z],
    [x + a, y + b, z],
    [x - a, y + b, z],
  ];
}

export function circle(r: number, z: number, n: number, x = 0, y = 0, wave = 0): Point[] {
  return Array.from({ length: n }, (_, i) => {
    const t = (i / n) * 2 * Math.PI;
    const rr = r + wave * Math.cos(12 * t);
    return [x + rr * Math.cos(t), y + rr * Math.sin(t), z];
  });
}

/** Square frustum: bottom side, height, draft of the walls in degrees. */
export function frustum(side: number, height: number, draftDeg: number): Float32Array {
  const top = side - 2 * height * Math.tan((draftDeg * Math.PI) / 180);
  const low = rectangle(side, side, 0);
  const high = rectangle(top, top, height);
  return new Soup().band(low, high).cap(high, [0, 0, height], true).cap(low, [0, 0, 0], false).done();
}

/** Box with a through bore of radius r in its middle (polygon of n sides). */
export function boxWithBore(w: number, d: number, h: number, r: number, n = 32): Float32Array {
  const soup = new Soup();
  const outline = (z: number) =>
    Array.from({ length: n }, (_, i): Point => {
      const t = (i / n) * 2 * Math.PI;
      const k = 1 / Math.max(Math.abs(Math.cos(t)) / (w / 2), Math.abs(Math.sin(t)) / (d / 2));
      return [k * Math.cos(t), k * Math.sin(t), z];
    });
  const [low, high] = [outline(0), outline(h)];
  const [boreLow, boreHigh] = [circle(r, 0, n), circle(r, h, n)];
  soup.band(low, high).band(boreHigh, boreLow);
  for (let i = 0; i < n; i++) {
    const j = (i + 1) % n;
    soup.quad(high[i], high[j], boreHigh[j], boreHigh[i]);
    soup.quad(low[j], low[i], boreLow[i], boreLow[j]);
  }
  return soup.done();
}

/** Hemisphere of radius r, `rings` of latitude, closed at the bed. */
export function hemisphere(r: number, rings: number): Float32Array {
  const n = rings * 4;
  const ring = (k: number) => {
    const t = ((k / rings) * Math.PI) / 2;
    return circle(r * Math.cos(t), r * Math.sin(t), n);
  };
  const soup = new Soup();
  for (let k = 0; k + 1 < rings; k++) soup.band(ring(k), ring(k + 1));
  return soup
    .cap(ring(rings - 1), [0, 0, r], true)
    .cap(ring(0), [0, 0, 0], false)
    .done();
}

export interface TrayOptions {
  columns: number;
  rows: number;
  segments: number;
  /** wall draft of each cup in turn, degrees */
  drafts: number[];
  flute: number;
  ventMm: number;
}

/**
 * A drafted plinth with fluted cups standing on it, each with an optional vent bore to the bed: one closed solid.
 * The top of the plinth is one square cell a cup, joined corner by corner to the cup's foot ring.
 */
export function tray(options: Partial<TrayOptions> = {}): Float32Array {
  const o = {
    columns: 3,
    rows: 2,
    segments: 96,
    drafts: [9, 9, 4, 9, 9, 6],
    flute: 0.8,
    ventMm: 1.2,
    ...options,
  };
  const pitch = 60;
  const [plinth, height, foot] = [14, 26, 23];
  const soup = new Soup();
  const n = o.segments;
  const corners = (x: number, y: number, z: number): Point[] => rectangle(pitch, pitch, z, x, y);
  for (let r = 0; r < o.rows; r++) {
    for (let c = 0; c < o.columns; c++) {
      const x = (c - (o.columns - 1) / 2) * pitch;
      const y = (r - (o.rows - 1) / 2) * pitch;
      const draft = (o.drafts[(r * o.columns + c) % o.drafts.length] * Math.PI) / 180;
      const top = foot - height * Math.tan(draft);
      const bore = o.ventMm / 2;
      const [footRing, topRing] = [
        circle(foot, plinth, n, x, y, o.flute),
        circle(top, plinth + height, n, x, y, o.flute),
      ];
      soup.band(footRing, topRing);
      const [boreTop, boreLow] = [circle(bore, plinth + height, n, x, y), circle(bore, 0, n, x, y)];
      soup.band(boreTop, boreLow);
      ringFloor(soup, corners(x, y, plinth), footRing, true);
      ringFloor(soup, corners(x, y, 0), boreLow, false);
      for (let i = 0; i < n; i++) {
        const j = (i + 1) % n;
        soup.quad(topRing[i], topRing[j], boreTop[j], boreTop[i]);
      }
    }
  }
  const [w, d] = [o.columns * pitch, o.rows * pitch];
  const flange = plinth * Math.tan((7 * Math.PI) / 180);
  const low = rectangle(w + 2 * flange, d + 2 * flange, 0);
  const high = rectangle(w, d, plinth);
  soup.band(low, high);
  const inner = rectangle(w, d, 0);
  for (let i = 0; i < 4; i++) {
    const j = (i + 1) % 4;
    soup.quad(low[j], low[i], inner[i], inner[j]);
  }
  return soup.done();
}

/** Flat floor between a square and a ring inside it: each ring edge goes to the nearest corner, corners in turn. */
function ringFloor(soup: Soup, square: Point[], ring: Point[], up: boolean): void {
  const n = ring.length;
  const quarter = (i: number) => Math.floor(((i + 0.5) / n) * 4) % 4;
  const cornerOf = [2, 3, 0, 1];
  for (let i = 0; i < n; i++) {
    const j = (i + 1) % n;
    const c = square[cornerOf[quarter(i)]];
    if (up) soup.tri(c, ring[j], ring[i]);
    else soup.tri(c, ring[i], ring[j]);
    const next = quarter(j);
    if (next !== quarter(i)) {
      const d = square[cornerOf[next]];
      if (up) soup.tri(c, d, ring[j]);
      else soup.tri(c, ring[j], d);
    }
  }
}

/** Each triangle cut into four, `times` over. */
export function subdivide(positions: Float32Array, times: number): Float32Array {
  let from = positions;
  for (let k = 0; k < times; k++) {
    const to = new Float32Array(from.length * 4);
    const mid = [0, 0, 0, 0, 0, 0, 0, 0, 0];
    for (let t = 0, o = 0; t < from.length; t += 9) {
      for (let e = 0; e < 3; e++) {
        for (let a = 0; a < 3; a++)
          mid[e * 3 + a] = (from[t + e * 3 + a] + from[t + ((e + 1) % 3) * 3 + a]) / 2;
      }
      const v = (e: number) => [from[t + e * 3], from[t + e * 3 + 1], from[t + e * 3 + 2]];
      const m = (e: number) => mid.slice(e * 3, e * 3 + 3);
      for (const p of [v(0), m(0), m(2), m(0), v(1), m(1), m(2), m(1), v(2), m(0), m(1), m(2)]) {
        to.set(p, o);
        o += 3;
      }
    }
    from = to;
  }
  return from;
}

/** Moves every point by a repeatable pseudo-random amount up to `amplitude` along z (not at the bed). */
export function roughen(positions: Float32Array, amplitude: number, seed: number): Float32Array {
  const out = positions.slice();
  for (let i = 0; i < out.length; i += 3) {
    if (out[i + 2] <= 1e-4) continue;
    let h = seed;
    for (let a = 0; a < 3; a++)
      h = Math.imul(h ^ Math.round(positions[i + a] * 1e4), 0x9e3779b1) ^ (h >>> 13);
    for (let a = 0; a < 3; a++) {
      h = Math.imul(h ^ (h >>> 15), 0x85ebca6b);
      if (a === 2 || out[i + 2] > 0.5) out[i + a] += ((h >>> 8) / 0xffffff - 0.5) * 2 * amplitude;
    }
  }
  return out;
}
