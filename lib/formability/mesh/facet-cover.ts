import type { FacetCuts } from './facet-cuts';

/** Work of a crossing of two segments: its height adds a slab. */
const CROSSING_STEPS = 10;

/** Steps left for all facets of a body together: segments compared, and segments looked at in each slab. */
export interface CoverBudget {
  steps: number;
}

/**
 * One cut facet laid flat, with the winding number of the space just outside it: known at its first corner, and
 * changed by one over every segment. Slabs between all heights at which anything begins, ends or crosses are exact.
 */
export class FacetCover {
  private readonly u = new Float64Array(3);
  private readonly v = new Float64Array(3);
  private su: number[] = [];
  private sv: number[] = [];
  private eu: number[] = [];
  private ev: number[] = [];
  /** Piercings of the facet's own edges: edge, height, jump from corner to corner. */
  private pierced: { edge: number; v: number; jump: number }[] = [];
  private lowest = 0;

  /** @param corners offsets of the facet's vertices in `p` */
  constructor(p: Float64Array, corners: readonly [number, number, number], cuts: FacetCuts, facet: number) {
    const [i, j] = flatAxes(p, corners);
    for (let k = 0; k < 3; k++) {
      this.u[k] = p[corners[k] + i];
      this.v[k] = p[corners[k] + j];
      if (this.v[k] < this.v[this.lowest]) this.lowest = k;
    }
    for (let s = cuts.head[facet]; s >= 0; s = cuts.next[s]) {
      const o = 6 * s;
      this.su.push(cuts.points[o + i]);
      this.sv.push(cuts.points[o + j]);
      this.eu.push(cuts.points[o + 3 + i]);
      this.ev.push(cuts.points[o + 3 + j]);
      const [start, end] = [cuts.startEdge[s], cuts.endEdge[s]];
      if (start >= 0) this.pierced.push({ edge: start, v: cuts.points[o + j], jump: -1 });
      if (end >= 0) this.pierced.push({ edge: end, v: cuts.points[o + 3 + j], jump: 1 });
    }
  }

  /** Share of the facet's area with winding 0 just outside, given the winding at its first corner; null where it costs more than is left. */
  shareOutside(first: number, budget: CoverBudget): number | null {
    const { u, v } = this;
    const whole = ((u[1] - u[0]) * (v[2] - v[0]) - (v[1] - v[0]) * (u[2] - u[0])) / 2;
    if (!(whole > 0)) return 0;
    const heights = this.heights(budget);
    if (heights === null) return null;
    const byFoot = this.su.map((_, s) => s).sort((a, b) => this.foot(a) - this.foot(b));
    let active: number[] = [];
    let taken = 0;
    let area = 0;
    for (let h = 0; h + 1 < heights.length; h++) {
      const thick = heights[h + 1] - heights[h];
      if (!(thick > 0)) continue;
      const at = heights[h] + thick / 2;
      while (taken < byFoot.length && this.foot(byFoot[taken]) <= at) active.push(byFoot[taken++]);
      active = active.filter((s) => this.head(s) > at);
      budget.steps -= active.length + this.pierced.length + 1;
      if (budget.steps < 0) return null;
      area += thick * this.widthOutside(at, first, active);
    }
    return Math.min(1, Math.max(0, area / whole));
  }

  /** Winding just outside at the middle of the facet, given the winding at its first corner. */
  windingAtMiddle(first: number): number {
    const at = (this.v[0] + this.v[1] + this.v[2]) / 3;
    const middle = (this.u[0] + this.u[1] + this.u[2]) / 3;
    let winding = this.leftWinding(at, first);
    for (let s = 0; s < this.su.length; s++) {
      if (this.foot(s) <= at && this.head(s) > at && this.across(s, at) < middle) winding += this.step(s);
    }
    return winding;
  }

  private widthOutside(at: number, first: number, active: number[]): number {
    const lines = active
      .map((s) => ({ u: this.across(s, at), step: this.step(s) }))
      .sort((a, b) => a.u - b.u);
    const right = this.side(at, true);
    let from = this.side(at, false);
    let winding = this.leftWinding(at, first);
    let width = 0;
    for (const line of lines) {
      if (winding === 0) width += line.u - from;
      from = line.u;
      winding += line.step;
    }
    return winding === 0 ? width + right - from : width;
  }

  /** All heights between which nothing begins, ends or crosses; null where they are too many to find. */
  private heights(budget: CoverBudget): number[] | null {
    const { sv, ev, v } = this;
    const heights = [...v, ...sv, ...ev];
    const byFoot = sv.map((_, s) => s).sort((a, b) => this.foot(a) - this.foot(b));
    for (let i = 0; i < byFoot.length; i++) {
      const top = this.head(byFoot[i]);
      for (let j = i + 1; j < byFoot.length && this.foot(byFoot[j]) < top; j++) {
        if (--budget.steps < 0) return null;
        const crossing = this.crossingHeight(byFoot[i], byFoot[j]);
        if (crossing === null) continue;
        budget.steps -= CROSSING_STEPS;
        heights.push(crossing);
      }
    }
    const low = v[this.lowest];
    const high = Math.max(v[0], v[1], v[2]);
    return heights.map((h) => Math.min(high, Math.max(low, h))).sort((a, b) => a - b);
  }

  private crossingHeight(a: number, b: number): number | null {
    const low = Math.max(this.foot(a), this.foot(b));
    const high = Math.min(this.head(a), this.head(b));
    const before = this.across(a, low) - this.across(b, low);
    const after = this.across(a, high) - this.across(b, high);
    if (!(before * after < 0)) return null;
    return low + ((high - low) * before) / (before - after);
  }

  private foot(s: number): number {
    return Math.min(this.sv[s], this.ev[s]);
  }

  private head(s: number): number {
    return Math.max(this.sv[s], this.ev[s]);
  }

  /** Going right over a segment that runs up leaves its inner side. */
  private step(s: number): number {
    return this.ev[s] > this.sv[s] ? -1 : 1;
  }

  private across(s: number, at: number): number {
    return this.su[s] + ((at - this.sv[s]) / (this.ev[s] - this.sv[s])) * (this.eu[s] - this.su[s]);
  }

  /** Winding just inside the left border: from the first corner round to the lowest, then up against the edges. */
  private leftWinding(at: number, first: number): number {
    const low = this.lowest;
    let winding = first;
    for (const { edge, v, jump } of this.pierced) {
      if (edge < low) winding += jump;
      if (v < at && this.leftEdges().includes(edge)) winding -= jump;
    }
    return winding;
  }

  private leftEdges(): number[] {
    const before = (this.lowest + 2) % 3;
    const after = (this.lowest + 1) % 3;
    return this.v[before] >= this.v[after] ? [before] : [before, after];
  }

  /** u of the left or right border at a height. */
  private side(at: number, right: boolean): number {
    const { u, v, lowest: low } = this;
    const near = right ? (low + 1) % 3 : (low + 2) % 3;
    const far = right ? (low + 2) % 3 : (low + 1) % 3;
    const [from, to] = at <= v[near] ? [low, near] : [near, far];
    return u[from] + ((at - v[from]) / (v[to] - v[from])) * (u[to] - u[from]);
  }
}

/** The two axes in which the facet is widest, in the order that keeps it counter-clockwise. */
function flatAxes(p: Float64Array, [a, b, c]: readonly [number, number, number]): [number, number] {
  const [ux, uy, uz] = [p[b] - p[a], p[b + 1] - p[a + 1], p[b + 2] - p[a + 2]];
  const [vx, vy, vz] = [p[c] - p[a], p[c + 1] - p[a + 1], p[c + 2] - p[a + 2]];
  const normal = [uy * vz - uz * vy, uz * vx - ux * vz, ux * vy - uy * vx];
  const size = normal.map(Math.abs);
  const k = size[2] >= size[0] && size[2] >= size[1] ? 2 : size[0] >= size[1] ? 0 : 1;
  const [i, j] = [(k + 1) % 3, (k + 2) % 3];
  return normal[k] > 0 ? [i, j] : [j, i];
}
