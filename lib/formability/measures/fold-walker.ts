import { neighbourOver, type Edges } from '../mesh/build-edges';
import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';

/** Facets that fold by less than 0.8° are one face. */
const ONE_FACE = Math.cos((0.8 * Math.PI) / 180);
const MOST_FACETS = 48;
const MOST_STRIPS = 64;
const WIDE = 3;

export interface Run {
  /** Width of all strips that the fold belongs to, mm. */
  width: number;
  /** Turn of the whole run, and on either side of the fold, rad. */
  turn: number;
  before: number;
  after: number;
}

/** Looks from an edge over the faces and strips beside it. */
export class FoldWalker {
  constructor(
    private readonly mesh: Mesh,
    private readonly facets: Facets,
    private readonly edges: Edges,
  ) {}

  length(e: number): number {
    const { position: p } = this.mesh;
    const i = this.edges.low[e] * 3;
    const j = this.edges.high[e] * 3;
    return Math.hypot(p[j] - p[i], p[j + 1] - p[i + 1], p[j + 2] - p[i + 2]);
  }

  middle(e: number): [number, number, number] {
    const { position: p } = this.mesh;
    const i = this.edges.low[e] * 3;
    const j = this.edges.high[e] * 3;
    return [(p[i] + p[j]) / 2, (p[i + 1] + p[j + 1]) / 2, (p[i + 2] + p[j + 2]) / 2];
  }

  /** True where the second facet falls away behind the first. */
  isConvex(e: number): boolean {
    const { position: p, index } = this.mesh;
    const { facetA, facetB, low, high } = this.edges;
    const a = facetA[e];
    const i = low[e] * 3;
    let apex = i;
    for (let k = 0; k < 3; k++) {
      const v = index[3 * facetB[e] + k];
      if (v !== low[e] && v !== high[e]) apex = v * 3;
    }
    const { nx, ny, nz } = this.facets;
    return nx[a] * (p[apex] - p[i]) + ny[a] * (p[apex + 1] - p[i + 1]) + nz[a] * (p[apex + 2] - p[i + 2]) < 0;
  }

  /** How far the face of a facet reaches from the edge's middle half, up to `enough`: coplanar neighbours belong to it. */
  faceWidth(facet: number, e: number, enough: number): number {
    const queue = [facet];
    let widest = 0;
    for (let at = 0; at < queue.length && at < MOST_FACETS; at++) {
      for (let k = 0; k < 3; k++) {
        const reach = this.reach(queue[at], k, e);
        if (reach < 0) continue;
        widest = Math.max(widest, reach);
        if (widest >= enough) return widest;
        const next = neighbourOver(this.edges, queue[at], k);
        if (next >= 0 && this.cos(facet, next) > ONE_FACE && !queue.includes(next)) queue.push(next);
      }
    }
    return widest;
  }

  /** Greatest distance from the edge's line of the part of a facet's side that lies over the edge's middle half; −1 where none does. */
  private reach(facet: number, side: number, e: number): number {
    const { index } = this.mesh;
    const v = index[3 * facet + side];
    const w = index[3 * facet + ((side + 1) % 3)];
    const [sv, sw] = [this.along(v, e), this.along(w, e)];
    const [dv, dw] = [this.fromLine(v, e), this.fromLine(w, e)];
    const from = Math.max(0.25, Math.min(sv, sw));
    const to = Math.min(0.75, Math.max(sv, sw));
    if (from > to) return -1;
    if (sv === sw) return Math.max(dv, dw);
    const at = (s: number) => dv + ((s - sv) / (sw - sv)) * (dw - dv);
    return Math.max(at(from), at(to));
  }

  /** Place of a vertex along an edge: 0 at its lower end, 1 at its higher one. */
  private along(v: number, e: number): number {
    const { position: p } = this.mesh;
    const i = this.edges.low[e] * 3;
    const j = this.edges.high[e] * 3;
    const [ux, uy, uz] = [p[j] - p[i], p[j + 1] - p[i + 1], p[j + 2] - p[i + 2]];
    const dot = ux * (p[3 * v] - p[i]) + uy * (p[3 * v + 1] - p[i + 1]) + uz * (p[3 * v + 2] - p[i + 2]);
    return dot / (ux * ux + uy * uy + uz * uz || 1);
  }

  /** False where behind a narrow face the surface folds back to a wide one: a single step. */
  endsSteps(e: number, narrow: number, convex: boolean, enough: number): boolean {
    const next = this.acrossStrip(e, narrow);
    if (!next || this.isConvex(next.edge) === convex) return true;
    return this.faceWidth(next.outer, next.edge, enough) < enough;
  }

  /** The strips on both sides of a fold, as long as they go on folding the same way. */
  run(e: number, convex: boolean, theta: number, width: number): Run {
    const a = this.side(e, this.edges.facetA[e], convex, WIDE * width);
    const b = this.side(e, this.edges.facetB[e], convex, WIDE * width);
    return { width: a.width + b.width, turn: theta + a.turn + b.turn, before: a.turn, after: b.turn };
  }

  private side(e: number, facet: number, convex: boolean, widest: number): { width: number; turn: number } {
    let width = 0;
    let turn = 0;
    for (let strip = 0; strip < MOST_STRIPS; strip++) {
      const next = this.acrossStrip(e, facet);
      // A much wider strip is the face that the rounding ends at.
      if (!next || next.width > widest) break;
      const fold = Math.acos(Math.min(1, this.cos(next.inner, next.outer)));
      width += next.width;
      if (this.isConvex(next.edge) !== convex || fold > Math.PI / 4.5) break;
      turn += fold;
      e = next.edge;
      facet = next.outer;
    }
    return { width, turn };
  }

  /** The far side of the strip that a facet belongs to: its edge most nearly parallel to the near one. */
  private acrossStrip(
    e: number,
    facet: number,
  ): { edge: number; inner: number; outer: number; width: number } | null {
    let best: { edge: number; inner: number; outer: number; width: number } | null = null;
    let parallel = 0.8;
    const strip = [facet];
    for (let at = 0; at < strip.length && at < 2; at++) {
      const own = strip[at];
      for (let k = 0; k < 3; k++) {
        const edge = this.edges.ofCorner[3 * own + k];
        const outer = neighbourOver(this.edges, own, k);
        if (edge === e || outer < 0 || strip.includes(outer)) continue;
        if (this.cos(own, outer) > ONE_FACE) {
          strip.push(outer);
          continue;
        }
        const along = Math.abs(this.cosOfEdges(e, edge));
        if (along <= parallel || this.meet(e, edge)) continue;
        parallel = along;
        const { low, high } = this.edges;
        const width = (this.fromLine(low[edge], e) + this.fromLine(high[edge], e)) / 2;
        best = { edge, inner: own, outer, width };
      }
    }
    return best;
  }

  private meet(e: number, f: number): boolean {
    const { low, high } = this.edges;
    return low[e] === low[f] || low[e] === high[f] || high[e] === low[f] || high[e] === high[f];
  }

  private cos(a: number, b: number): number {
    const { nx, ny, nz } = this.facets;
    return nx[a] * nx[b] + ny[a] * ny[b] + nz[a] * nz[b];
  }

  private cosOfEdges(e: number, f: number): number {
    const { position: p } = this.mesh;
    const { low, high } = this.edges;
    const dot = [0, 1, 2].reduce(
      (sum, k) => sum + (p[3 * high[e] + k] - p[3 * low[e] + k]) * (p[3 * high[f] + k] - p[3 * low[f] + k]),
      0,
    );
    return dot / (this.length(e) * this.length(f) || 1);
  }

  /** Distance of a vertex from the edge's line. */
  private fromLine(v: number, e: number): number {
    const { position: p } = this.mesh;
    const i = this.edges.low[e] * 3;
    const j = this.edges.high[e] * 3;
    const [ux, uy, uz] = [p[j] - p[i], p[j + 1] - p[i + 1], p[j + 2] - p[i + 2]];
    const [wx, wy, wz] = [p[3 * v] - p[i], p[3 * v + 1] - p[i + 1], p[3 * v + 2] - p[i + 2]];
    const cross = Math.hypot(uy * wz - uz * wy, uz * wx - ux * wz, ux * wy - uy * wx);
    return cross / (Math.hypot(ux, uy, uz) || 1);
  }
}
