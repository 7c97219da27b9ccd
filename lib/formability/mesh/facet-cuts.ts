import type { Crossing } from './pierce-facets';

/** Segments that other facets cut into each facet, as linked lists; the inner side of the other lies to the left. */
export class FacetCuts {
  /** First segment of each facet, −1 where none. */
  readonly head: Int32Array;
  next = new Int32Array(1024);
  /** 6 per segment: start and end. */
  points = new Float64Array(6 * 1024);
  /** Edge of the facet that carries the segment's start, and its end; −1 for an end inside. */
  startEdge = new Int8Array(1024);
  endEdge = new Int8Array(1024);
  count = 0;

  constructor(triangles: number) {
    this.head = new Int32Array(triangles).fill(-1);
  }

  /** Notes one crossing in both facets. */
  add(f: number, g: number, crossing: Crossing): void {
    this.push(f, crossing.points, 0, 3, crossing.startEdgeOfA, crossing.endEdgeOfA);
    this.push(g, crossing.points, 3, 0, crossing.startEdgeOfB, crossing.endEdgeOfB);
  }

  /** How the winding just outside a facet changes along its edge `edge`, from corner to corner. */
  jumpAlong(facet: number, edge: number): number {
    let jump = 0;
    for (let s = this.head[facet]; s >= 0; s = this.next[s]) {
      if (this.endEdge[s] === edge) jump++;
      if (this.startEdge[s] === edge) jump--;
    }
    return jump;
  }

  private push(
    f: number,
    points: Float64Array,
    from: number,
    to: number,
    startEdge: number,
    endEdge: number,
  ): void {
    if (this.count === this.next.length) this.grow();
    const s = this.count++;
    for (let k = 0; k < 3; k++) {
      this.points[6 * s + k] = points[from + k];
      this.points[6 * s + 3 + k] = points[to + k];
    }
    this.startEdge[s] = startEdge;
    this.endEdge[s] = endEdge;
    this.next[s] = this.head[f];
    this.head[f] = s;
  }

  private grow(): void {
    const size = 2 * this.next.length;
    const wider = <T extends { set(from: T): void }>(into: T, from: T): T => (into.set(from), into);
    this.next = wider(new Int32Array(size), this.next);
    this.points = wider(new Float64Array(6 * size), this.points);
    this.startEdge = wider(new Int8Array(size), this.startEdge);
    this.endEdge = wider(new Int8Array(size), this.endEdge);
  }
}
