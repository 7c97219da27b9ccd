import type { Weld } from './weld-vertices';

/** Cells of the search grid, in tolerances: wide enough that most points look into one cell only. */
const CELL = 16;

/**
 * Welds again: each vertex marked `loose` (it lies on an open edge) joins the first earlier loose one within
 * `tolerance`, a length in the mesh's own unit. `joined` are the new numbers of the vertices that took in others.
 */
export function weldTolerant(weld: Weld, loose: Uint8Array, tolerance: number): Weld & { joined: number[] } {
  const { coords, vertices } = weld;
  const cell = tolerance * CELL;
  let size = 16;
  for (let v = 0; v < vertices; v++) if (loose[v]) size++;
  const table = new Int32Array(1 << Math.ceil(Math.log2(size * 2))).fill(-1);
  const chain = new Int32Array(vertices).fill(-1);
  const mask = table.length - 1;
  const target = new Uint32Array(vertices);
  const slotOf = (i: number, j: number, k: number) =>
    (Math.imul(i, 73856093) ^ Math.imul(j, 19349663) ^ Math.imul(k, 83492791)) & mask;
  const reach = (value: number) => {
    const here = Math.floor(value / cell);
    const rest = value - here * cell;
    return rest < tolerance ? [here, here - 1] : rest > cell - tolerance ? [here, here + 1] : [here];
  };
  for (let v = 0; v < vertices; v++) {
    target[v] = v;
    if (!loose[v]) continue;
    const [x, y, z] = [coords[3 * v], coords[3 * v + 1], coords[3 * v + 2]];
    const [xs, ys, zs] = [reach(x), reach(y), reach(z)];
    let join = v;
    for (const i of xs) {
      for (const j of ys) {
        for (const k of zs) {
          for (let w = table[slotOf(i, j, k)]; w >= 0; w = chain[w]) {
            const far = Math.hypot(coords[3 * w] - x, coords[3 * w + 1] - y, coords[3 * w + 2] - z);
            if (far <= tolerance && w < join) join = w;
          }
        }
      }
    }
    target[v] = join;
    if (join === v) {
      const slot = slotOf(xs[0], ys[0], zs[0]);
      chain[v] = table[slot];
      table[slot] = v;
    }
  }
  return compact(weld, target);
}

function compact(weld: Weld, target: Uint32Array): Weld & { joined: number[] } {
  const number = new Uint32Array(weld.vertices);
  const coords = new Float32Array(weld.coords.length);
  const joined: number[] = [];
  let kept = 0;
  for (let v = 0; v < weld.vertices; v++) {
    if (target[v] !== v) {
      joined.push(number[target[v]]);
      continue;
    }
    for (let k = 0; k < 3; k++) coords[3 * kept + k] = weld.coords[3 * v + k];
    number[v] = kept++;
  }
  return {
    index: weld.index.map((v) => number[target[v]]),
    vertices: kept,
    coords: coords.slice(0, 3 * kept),
    joined,
  };
}
