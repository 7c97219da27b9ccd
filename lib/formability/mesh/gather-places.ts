import type { MeshPlace, MeshWarning } from '../report';

/** Places told for each warning, the gravest first. */
const MOST_PLACES = 12;
/** Items beyond this number are counted by the caller, but not gathered. */
const MOST_ITEMS = 50_000;

/**
 * Gathers edges or facets that hang together into places: the middle, the span and the number of each cluster. In the
 * order of their number, then span, so that the order never hangs on the file's.
 * @param items vertex numbers, `per` to an item
 * @param position 3 per vertex, in the mesh's frame; `centre` brings x and y back to the file's
 */
export function gatherPlaces(
  code: MeshWarning,
  position: ArrayLike<number>,
  centre: readonly [number, number],
  items: ArrayLike<number>,
  per: number,
): MeshPlace[] {
  const root = new Map<number, number>();
  const find = (v: number): number => {
    let up = root.get(v) ?? v;
    while (up !== (root.get(up) ?? up)) up = root.get(up) as number;
    root.set(v, up);
    return up;
  };
  const length = Math.min(items.length, MOST_ITEMS * per);
  for (let i = 0; i < length; i += per) {
    for (let k = 1; k < per; k++) {
      const [a, b] = [find(items[i]), find(items[i + k])];
      if (a !== b) root.set(Math.max(a, b), Math.min(a, b));
    }
  }
  const clusters = new Map<number, Cluster>();
  for (let i = 0; i < length; i += per) {
    const key = find(items[i]);
    let cluster = clusters.get(key);
    if (!cluster) clusters.set(key, (cluster = newCluster()));
    cluster.count++;
    for (let k = 0; k < per; k++) addPoint(cluster, position, 3 * items[i + k]);
  }
  return placesOf(code, [...clusters.values()], centre);
}

/** The same from bare points, 3 coordinates each; `keyOf` says to which place the i-th belongs. */
export function gatherPoints(
  code: MeshWarning,
  points: ArrayLike<number>,
  centre: readonly [number, number],
  keyOf: (i: number) => number | string,
): MeshPlace[] {
  const clusters = new Map<number | string, Cluster>();
  for (let i = 0; 3 * i < Math.min(points.length, 3 * MOST_ITEMS); i++) {
    const key = keyOf(i);
    let cluster = clusters.get(key);
    if (!cluster) clusters.set(key, (cluster = newCluster()));
    cluster.count++;
    addPoint(cluster, points, 3 * i);
  }
  return placesOf(code, [...clusters.values()], centre);
}

/** One place for each shell: the middle of its box. */
export function placesOfBoxes(
  code: MeshWarning,
  boxes: Float64Array,
  which: readonly number[],
  centre: readonly [number, number],
): MeshPlace[] {
  const corners = which.flatMap((s) => [...boxes.subarray(6 * s, 6 * s + 6)]);
  const pairs = which.flatMap((_, i) => [2 * i, 2 * i + 1]);
  return gatherPlaces(code, corners, centre, pairs, 2);
}

interface Cluster {
  count: number;
  points: number;
  sum: [number, number, number];
  low: [number, number, number];
  high: [number, number, number];
}

function newCluster(): Cluster {
  return {
    count: 0,
    points: 0,
    sum: [0, 0, 0],
    low: [Infinity, Infinity, Infinity],
    high: [-Infinity, -Infinity, -Infinity],
  };
}

function addPoint(cluster: Cluster, from: ArrayLike<number>, at: number): void {
  cluster.points++;
  for (let k = 0; k < 3; k++) {
    cluster.sum[k] += from[at + k];
    cluster.low[k] = Math.min(cluster.low[k], from[at + k]);
    cluster.high[k] = Math.max(cluster.high[k], from[at + k]);
  }
}

function placesOf(code: MeshWarning, clusters: Cluster[], [x, y]: readonly [number, number]): MeshPlace[] {
  const places = clusters.map((one): MeshPlace => {
    const [mx, my, mz] = one.sum.map((sum) => sum / one.points);
    return {
      code,
      at: [mx + x, my + y, mz],
      count: one.count,
      sizeMm: Math.hypot(...one.high.map((h, k) => h - one.low[k])),
    };
  });
  const [a, b] = [0, 1];
  places.sort(
    (p, q) =>
      q.count - p.count || q.sizeMm - p.sizeMm || p.at[a] - q.at[a] || p.at[b] - q.at[b] || p.at[2] - q.at[2],
  );
  return places.slice(0, MOST_PLACES);
}
