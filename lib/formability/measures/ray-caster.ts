import type { Mesh } from '../mesh/mesh';
import type { FacetGrid } from './facet-grid';

/** Room for rounding on a facet's rim, as a share of the facet: a ray through a shared edge hits both, never none. */
const RIM = 1e-9;
/** Solid that begins nearer than this behind a face, in mm, touches it (as the columns hold it). */
const TOUCH_MM = 1e-4;
/** A ray's own start, mm. */
const START_MM = 1e-6;

/** More crossings than this on one ray, or facets looked at by all, and the answer is "nothing ends it". */
const MOST_CROSSINGS = 200;
const MOST_LOOKS = 20_000_000;

/** Rays inside the solid, or through the air outside it, answered without allocation. */
export class RayCaster {
  /** Facet through which the last ray left, or −1. */
  exit = -1;
  private readonly t = new Float64Array(MOST_CROSSINGS + 2);
  private readonly facet = new Int32Array(MOST_CROSSINGS + 2);
  /** −1 out of the solid, +1 into it. */
  private readonly turn = new Int8Array(MOST_CROSSINGS + 2);
  /** Hits passed stay listed, so that no facet counts twice. */
  private readonly passed = new Uint8Array(MOST_CROSSINGS + 2);
  /** Start and direction of the ray at hand. */
  private readonly ray = new Float64Array(6);
  private held = 0;
  private looks = 0;

  constructor(
    private readonly mesh: Mesh,
    private readonly grid: FacetGrid,
    private readonly mostLooks = MOST_LOOKS,
  ) {}

  /**
   * How far a ray goes through air before it enters solid.
   * @param from facet on which the ray starts, not hit itself; −1 for none
   * @returns length in mm; NaN where nothing is met, or where the ray leaves solid first: it began inside. `exit` is
   * the facet first met, or −1
   */
  airAlong(
    from: number,
    x: number,
    y: number,
    z: number,
    dx: number,
    dy: number,
    dz: number,
    longest: number,
  ): number {
    return this.along(true, from, x, y, z, dx, dy, dz, longest);
  }

  /**
   * How far a ray stays inside the solid. It starts inside (winding number 1); bodies that overlap or touch count as
   * one, so it goes on until the winding number falls to 0 for good.
   * @param from facet on which the ray starts, not hit itself
   * @param d unit direction
   * @param longest gives up beyond this
   * @returns length in mm, or NaN where nothing ends it; `exit` is the facet that did
   */
  solidAlong(
    from: number,
    x: number,
    y: number,
    z: number,
    dx: number,
    dy: number,
    dz: number,
    longest: number,
  ): number {
    return this.along(false, from, x, y, z, dx, dy, dz, longest);
  }

  private along(
    air: boolean,
    from: number,
    x: number,
    y: number,
    z: number,
    dx: number,
    dy: number,
    dz: number,
    longest: number,
  ): number {
    const { cell, count, low, start, occupied } = this.grid;
    const { ray } = this;
    const [nx, ny, nz] = count;
    ray[0] = x;
    ray[1] = y;
    ray[2] = z;
    ray[3] = dx;
    ray[4] = dy;
    ray[5] = dz;
    let i = clamp(Math.floor((x - low[0]) / cell), nx);
    let j = clamp(Math.floor((y - low[1]) / cell), ny);
    let k = clamp(Math.floor((z - low[2]) / cell), nz);
    const si = dx > 0 ? 1 : -1;
    const sj = dy > 0 ? 1 : -1;
    const sk = dz > 0 ? 1 : -1;
    // Distance to the next wall of cells, and between walls, along each axis.
    const stepX = dx === 0 ? Infinity : cell / Math.abs(dx);
    const stepY = dy === 0 ? Infinity : cell / Math.abs(dy);
    const stepZ = dz === 0 ? Infinity : cell / Math.abs(dz);
    let toX = dx === 0 ? Infinity : (low[0] + (i + (dx > 0 ? 1 : 0)) * cell - x) / dx;
    let toY = dy === 0 ? Infinity : (low[1] + (j + (dy > 0 ? 1 : 0)) * cell - y) / dy;
    let toZ = dz === 0 ? Infinity : (low[2] + (k + (dz > 0 ? 1 : 0)) * cell - z) / dz;
    this.held = 0;
    this.exit = -1;
    if (this.looks > this.mostLooks) return NaN;
    let winding = 1;
    let left = NaN;
    for (;;) {
      const c = (k * ny + j) * nx + i;
      if (occupied[c >> 5] & (1 << (c & 31))) {
        this.lookInto(start[c], start[c + 1], from);
        // Each hit is compared with those held: a heap costs by both.
        this.looks += (start[c + 1] - start[c]) * (1 + (this.held >> 3));
        if (this.held > MOST_CROSSINGS || this.looks > this.mostLooks) return NaN;
      }
      const reach = toX < toY ? (toX < toZ ? toX : toZ) : toY < toZ ? toY : toZ;
      while (this.held > 0) {
        const next = this.nearest();
        if (next < 0 || this.t[next] > reach) break;
        const t = this.t[next];
        if (air) {
          this.exit = this.facet[next];
          return this.turn[next] > 0 ? t : NaN;
        }
        if (winding <= 0 && t > left + TOUCH_MM) return left;
        if (this.turn[next] < 0) {
          winding--;
          if (winding <= 0 && !(left >= 0)) {
            left = t;
            this.exit = this.facet[next];
          }
        } else if (++winding > 0) left = NaN;
        this.passed[next] = 1;
      }
      if (winding <= 0 && reach > left + TOUCH_MM) return left;
      if (reach > longest) return NaN;
      if (toX <= toY && toX <= toZ) {
        i += si;
        toX += stepX;
        if (i < 0 || i >= nx) break;
      } else if (toY <= toZ) {
        j += sj;
        toY += stepY;
        if (j < 0 || j >= ny) break;
      } else {
        k += sk;
        toZ += stepZ;
        if (k < 0 || k >= nz) break;
      }
    }
    return winding <= 0 ? left : NaN;
  }

  /** The nearest hit not yet passed, or −1. */
  private nearest(): number {
    let best = -1;
    for (let h = 0; h < this.held; h++) {
      if (!this.passed[h] && (best < 0 || this.t[h] < this.t[best])) best = h;
    }
    return best;
  }

  /** The ray against the facets listed in a cell (T. Möller, B. Trumbore, Journal of Graphics Tools 2 (1997) 21–28). */
  private lookInto(first: number, end: number, from: number): void {
    const { facet: list } = this.grid;
    const { index, position: p } = this.mesh;
    const { ray } = this;
    const x = ray[0];
    const y = ray[1];
    const z = ray[2];
    const dx = ray[3];
    const dy = ray[4];
    const dz = ray[5];
    for (let at = first; at < end; at++) {
      const f = list[at];
      if (f === from) continue;
      const a = index[3 * f] * 3;
      const b = index[3 * f + 1] * 3;
      const c = index[3 * f + 2] * 3;
      const ux = p[b] - p[a];
      const uy = p[b + 1] - p[a + 1];
      const uz = p[b + 2] - p[a + 2];
      const vx = p[c] - p[a];
      const vy = p[c + 1] - p[a + 1];
      const vz = p[c + 2] - p[a + 2];
      const hx = dy * vz - dz * vy;
      const hy = dz * vx - dx * vz;
      const hz = dx * vy - dy * vx;
      const det = ux * hx + uy * hy + uz * hz;
      if (det === 0) continue;
      const inverse = 1 / det;
      const ox = x - p[a];
      const oy = y - p[a + 1];
      const oz = z - p[a + 2];
      const s = (ox * hx + oy * hy + oz * hz) * inverse;
      if (s < -RIM || s > 1 + RIM) continue;
      const qx = oy * uz - oz * uy;
      const qy = oz * ux - ox * uz;
      const qz = ox * uy - oy * ux;
      const r = (dx * qx + dy * qy + dz * qz) * inverse;
      if (r < -RIM || s + r > 1 + RIM) continue;
      const t = (vx * qx + vy * qy + vz * qz) * inverse;
      // det > 0 where the ray meets the facet's front: it enters there.
      if (t > START_MM) this.keep(f, t, det > 0 ? 1 : -1);
    }
  }

  private keep(f: number, t: number, turn: number): void {
    if (this.held > MOST_CROSSINGS) return;
    for (let h = 0; h < this.held; h++) {
      if (this.facet[h] === f) return;
      // Both facets of an edge that the ray goes through: one crossing.
      if (this.turn[h] === turn && Math.abs(this.t[h] - t) < START_MM && this.share(this.facet[h], f)) return;
    }
    this.t[this.held] = t;
    this.facet[this.held] = f;
    this.turn[this.held] = turn;
    this.passed[this.held] = 0;
    this.held++;
  }

  private share(f: number, g: number): boolean {
    const { index } = this.mesh;
    for (let k = 0; k < 3; k++) {
      const v = index[3 * f + k];
      if (v === index[3 * g] || v === index[3 * g + 1] || v === index[3 * g + 2]) return true;
    }
    return false;
  }
}

function clamp(value: number, count: number): number {
  return value < 0 ? 0 : value >= count ? count - 1 : value;
}
