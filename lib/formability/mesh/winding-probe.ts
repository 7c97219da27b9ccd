/** Buckets along a side of the plan, per square root of the facets. */
const BUCKETS = 0.7;
/** Buckets that would hold more entries than this are made wider: facets that all reach far fill every bucket. */
const MOST_ENTRIES = 2 ** 23;
/** Facets looked at by all rays together, a second or two: many shells that all lie over one another want more. */
const MOST_LOOKS = 1e7;

/** Winding numbers at points, by signed crossings of a vertical ray with the facets of the bucket it runs through. */
export class WindingProbe {
  private readonly start: Uint32Array;
  private readonly facets: Uint32Array;
  private side: number;
  private readonly low: [number, number] = [Infinity, Infinity];
  private scale: [number, number];
  private looks = 0;

  constructor(
    private readonly index: Uint32Array,
    private readonly p: Float64Array,
  ) {
    const triangles = index.length / 3;
    const high = [-Infinity, -Infinity];
    for (const v of index) {
      for (let k = 0; k < 2; k++) {
        this.low[k] = Math.min(this.low[k], p[3 * v + k]);
        high[k] = Math.max(high[k], p[3 * v + k]);
      }
    }
    this.side = Math.max(1, Math.min(512, Math.floor(BUCKETS * Math.sqrt(triangles))));
    const scaleOf = (k: number) => this.side / Math.max(high[k] - this.low[k], 1e-300);
    this.scale = [scaleOf(0), scaleOf(1)];
    while (this.side > 1 && this.countEntries() > MOST_ENTRIES) {
      this.side >>= 1;
      this.scale = [scaleOf(0), scaleOf(1)];
    }
    this.start = new Uint32Array(this.side * this.side + 1);
    this.eachBucket((bucket) => this.start[bucket + 1]++);
    for (let b = 1; b < this.start.length; b++) this.start[b] += this.start[b - 1];
    this.facets = new Uint32Array(this.start[this.start.length - 1]);
    const fill = this.start.slice();
    this.eachBucket((bucket, t) => (this.facets[fill[bucket]++] = t));
  }

  /**
   * The winding number at a point, NaN once all rays together have looked at too many facets: then nobody knows.
   * @param counts which facets count
   * @param up ray along +Z, or along −Z
   */
  windingAt(x: number, y: number, z: number, up: boolean, counts: (facet: number) => boolean): number {
    const { index, p, start, facets } = this;
    const bucket = this.cell(x, 0) + this.side * this.cell(y, 1);
    let winding = 0;
    this.looks += start[bucket + 1] - start[bucket];
    if (this.looks > MOST_LOOKS) return NaN;
    for (let f = start[bucket]; f < start[bucket + 1]; f++) {
      const t = facets[f];
      if (!counts(t)) continue;
      let turn = 0;
      for (let side = 0; side < 3; side++) {
        const a = 3 * index[3 * t + side];
        const b = 3 * index[3 * t + ((side + 1) % 3)];
        const rises = p[a + 1] <= y;
        if (rises === p[b + 1] <= y) continue;
        // From the lower end always, so that both facets of an edge get the same bits.
        const [low, high] = rises ? [a, b] : [b, a];
        const across = p[low] + ((y - p[low + 1]) / (p[high + 1] - p[low + 1])) * (p[high] - p[low]);
        if (across > x) turn += rises ? 1 : -1;
      }
      if (turn !== 0 && this.heightOver(t, x, y) > z === up) winding += turn;
    }
    return up ? winding : -winding;
  }

  private heightOver(t: number, x: number, y: number): number {
    const { index, p } = this;
    const a = 3 * index[3 * t];
    const b = 3 * index[3 * t + 1];
    const c = 3 * index[3 * t + 2];
    const [ux, uy, uz] = [p[b] - p[a], p[b + 1] - p[a + 1], p[b + 2] - p[a + 2]];
    const [vx, vy, vz] = [p[c] - p[a], p[c + 1] - p[a + 1], p[c + 2] - p[a + 2]];
    const area = ux * vy - uy * vx;
    const r = ((x - p[a]) * vy - (y - p[a + 1]) * vx) / area;
    const s = (ux * (y - p[a + 1]) - uy * (x - p[a])) / area;
    return p[a + 2] + r * uz + s * vz;
  }

  private cell(value: number, axis: 0 | 1): number {
    return Math.min(this.side - 1, Math.max(0, Math.floor((value - this.low[axis]) * this.scale[axis])));
  }

  /** Entries of all buckets together, as a double: they may be more than 2³². */
  private countEntries(): number {
    let entries = 0;
    this.eachExtent((_, fromX, toX, fromY, toY) => (entries += (toX - fromX + 1) * (toY - fromY + 1)));
    return entries;
  }

  private eachBucket(visit: (bucket: number, t: number) => void): void {
    this.eachExtent((t, fromX, toX, fromY, toY) => {
      for (let j = fromY; j <= toY; j++) {
        for (let i = fromX; i <= toX; i++) visit(j * this.side + i, t);
      }
    });
  }

  private eachExtent(
    visit: (t: number, fromX: number, toX: number, fromY: number, toY: number) => void,
  ): void {
    const { index, p } = this;
    for (let t = 0; t < index.length / 3; t++) {
      const a = 3 * index[3 * t];
      const b = 3 * index[3 * t + 1];
      const c = 3 * index[3 * t + 2];
      const fromX = this.cell(Math.min(p[a], p[b], p[c]), 0);
      const toX = this.cell(Math.max(p[a], p[b], p[c]), 0);
      const fromY = this.cell(Math.min(p[a + 1], p[b + 1], p[c + 1]), 1);
      const toY = this.cell(Math.max(p[a + 1], p[b + 1], p[c + 1]), 1);
      visit(t, fromX, toX, fromY, toY);
    }
  }
}
