import { orientation } from './orientation';

/** Where two facets cross, as both of them see it: end points in space, and which edge each end lies on. */
export interface Crossing {
  /** 6 numbers: start and end as the first facet sees them; the second sees them the other way round. */
  points: Float64Array;
  /** Edge (0, 1, 2) of the first facet that carries the start and the end, or −1. */
  startEdgeOfA: number;
  endEdgeOfA: number;
  startEdgeOfB: number;
  endEdgeOfB: number;
}

export type Meeting = 'apart' | 'crossing' | 'doubtful';

/**
 * Whether two facets without a common vertex cross, on positions in general position. A segment runs so that, seen
 * from the first facet's normal, the inner side of the second facet lies to its left.
 * @returns doubtful where the signs contradict one another
 */
export function pierceFacets(
  p: Float64Array,
  index: Uint32Array,
  f: number,
  g: number,
  out: Crossing,
): Meeting {
  const a = 3 * f;
  const b = 3 * g;
  for (let k = 0; k < 3; k++) {
    sideB[k] = orientation(p, index[a], index[a + 1], index[a + 2], index[b + k]);
    sideA[k] = orientation(p, index[b], index[b + 1], index[b + 2], index[a + k]);
  }
  if (alike(sideB) || alike(sideA)) return 'apart';
  out.startEdgeOfA = out.endEdgeOfA = out.startEdgeOfB = out.endEdgeOfB = -1;
  let starts = 0;
  let ends = 0;
  for (let k = 0; k < 3; k++) {
    const n = (k + 1) % 3;
    if (sideA[k] > 0 !== sideA[n] > 0 && passes(p, index, index[a + k], index[a + n], b)) {
      const isEnd = sideA[k] > 0;
      if (isEnd) {
        out.endEdgeOfA = k;
        ends++;
      } else {
        out.startEdgeOfA = k;
        starts++;
      }
      writePoint(p, index[a + k], index[a + n], sideA[k], sideA[n], out.points, isEnd ? 3 : 0);
    }
    if (sideB[k] > 0 !== sideB[n] > 0 && passes(p, index, index[b + k], index[b + n], a)) {
      const isEnd = !(sideB[k] > 0);
      if (isEnd) {
        out.startEdgeOfB = k;
        ends++;
      } else {
        out.endEdgeOfB = k;
        starts++;
      }
      writePoint(p, index[b + k], index[b + n], sideB[k], sideB[n], out.points, isEnd ? 3 : 0);
    }
  }
  if (starts === 0 && ends === 0) return 'apart';
  return starts === 1 && ends === 1 ? 'crossing' : 'doubtful';
}

/** Whether the edge opposite a shared vertex goes through the other facet: two facets of one fan that cross. */
export function crossesFromVertex(
  p: Float64Array,
  index: Uint32Array,
  f: number,
  g: number,
  shared: number,
): boolean {
  return passesOpposite(p, index, f, g, shared) || passesOpposite(p, index, g, f, shared);
}

function passesOpposite(
  p: Float64Array,
  index: Uint32Array,
  of: number,
  through: number,
  v: number,
): boolean {
  const k = index[3 * of] === v ? 0 : index[3 * of + 1] === v ? 1 : 2;
  const from = index[3 * of + ((k + 1) % 3)];
  const to = index[3 * of + ((k + 2) % 3)];
  const [i, j, l] = [index[3 * through], index[3 * through + 1], index[3 * through + 2]];
  const one = orientation(p, i, j, l, from);
  const two = orientation(p, i, j, l, to);
  return one > 0 !== two > 0 && passes(p, index, from, to, 3 * through);
}

const sideA = new Float64Array(3);
const sideB = new Float64Array(3);

function alike(side: Float64Array): boolean {
  return side[0] > 0 === side[1] > 0 && side[1] > 0 === side[2] > 0;
}

/** Whether the line through two vertices goes through the inside of the facet at corner number `at`. */
function passes(p: Float64Array, index: Uint32Array, from: number, to: number, at: number): boolean {
  const one = orientation(p, from, to, index[at], index[at + 1]) > 0;
  const two = orientation(p, from, to, index[at + 1], index[at + 2]) > 0;
  return one === two && two === orientation(p, from, to, index[at + 2], index[at]) > 0;
}

/** The point on an edge, reckoned from its lower vertex so that both facets of the edge get the same bits. */
function writePoint(
  p: Float64Array,
  from: number,
  to: number,
  dFrom: number,
  dTo: number,
  out: Float64Array,
  at: number,
): void {
  const [i, j, di, dj] = from < to ? [from, to, dFrom, dTo] : [to, from, dTo, dFrom];
  const t = di / (di - dj);
  for (let k = 0; k < 3; k++) out[at + k] = p[3 * i + k] + t * (p[3 * j + k] - p[3 * i + k]);
}
