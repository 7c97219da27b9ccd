/** Boxes in a leaf: of 2, 4 and 8 the last was fastest on curved surfaces. */
const LEAF = 8;
const AXIS_CELLS = 1023;
/** Room for the item number below the 30-bit cell key in a double: 53 bits in all. */
const ITEM_SPAN = 2 ** 23;

/** Boxes in Morton order under a complete binary tree; finds every pair of overlapping boxes. */
export interface BoxTree {
  /** Item numbers in tree order. */
  order: Uint32Array;
  /** 6 per item (minimum, maximum), in tree order. */
  boxes: Float64Array;
  /** 6 per node, heap numbered from 1. */
  nodes: Float64Array;
  leaves: number;
  /** Group of each item, in tree order, and of each node, −1 where it holds several; null where all pairs count. */
  groups: { items: Int32Array; nodes: Int32Array } | null;
  /** More items than can be told apart: the tree is empty, and a search in it is incomplete. */
  tooMany: boolean;
}

/**
 * @param given 6 per item: minimum x, y, z, maximum x, y, z; with more than 8 million items nothing is searched
 * @param groupOf where given, pairs within one group are passed over
 */
export function buildBoxTree(given: Float64Array, groupOf?: (item: number) => number): BoxTree {
  const tooMany = given.length / 6 > ITEM_SPAN;
  const n = tooMany ? 0 : given.length / 6;
  const order = mortonOrder(given, n);
  const boxes = new Float64Array(6 * n);
  for (let i = 0; i < n; i++) for (let k = 0; k < 6; k++) boxes[6 * i + k] = given[6 * order[i] + k];
  let leaves = 1;
  while (leaves * LEAF < n) leaves *= 2;
  const nodes = new Float64Array(12 * leaves);
  for (let node = leaves; node < 2 * leaves; node++) {
    clear(nodes, node);
    const last = leafStart(n, leaves, node + 1);
    for (let k = leafStart(n, leaves, node); k < last; k++) widen(nodes, 6 * node, boxes, 6 * k);
  }
  for (let node = leaves - 1; node > 0; node--) {
    clear(nodes, node);
    widen(nodes, 6 * node, nodes, 12 * node);
    widen(nodes, 6 * node, nodes, 12 * node + 6);
  }
  return {
    order,
    boxes,
    nodes,
    leaves,
    groups: groupOf ? groupNodes(order, leaves, groupOf) : null,
    tooMany,
  };
}

function groupNodes(order: Uint32Array, leaves: number, groupOf: (item: number) => number) {
  const n = order.length;
  const items = Int32Array.from(order, groupOf);
  const nodes = new Int32Array(2 * leaves).fill(-1);
  for (let node = leaves; node < 2 * leaves; node++) {
    const first = leafStart(n, leaves, node);
    const last = leafStart(n, leaves, node + 1);
    nodes[node] = first < last ? items[first] : -1;
    for (let k = first; k < last; k++) if (items[k] !== nodes[node]) nodes[node] = -1;
  }
  for (let node = leaves - 1; node > 0; node--) {
    if (nodes[2 * node] === nodes[2 * node + 1]) nodes[node] = nodes[2 * node];
  }
  return { items, nodes };
}

/**
 * Visits every pair of items whose boxes come within `near` of one another, each once, until `visit` returns false.
 * @returns false where it was stopped, or where the tree was given too many items to search
 */
export function visitPairs(tree: BoxTree, near: number, visit: (a: number, b: number) => boolean): boolean {
  const { order, boxes, nodes, leaves, groups } = tree;
  if (tree.tooMany) return false;
  const n = order.length;
  // Both nodes of a pair lie at one depth; each step down adds at most three waiting pairs.
  const stack = new Int32Array(2 * (4 + 3 * (Math.log2(leaves) + 1)));
  let waiting = 2;
  stack[0] = stack[1] = 1;
  while (waiting > 0) {
    const b = stack[--waiting];
    const a = stack[--waiting];
    if (a < leaves) {
      for (let i = 2 * a; i < 2 * a + 2; i++) {
        for (let j = a === b ? i : 2 * b; j < 2 * b + 2; j++) {
          if (groups && groups.nodes[i] >= 0 && groups.nodes[i] === groups.nodes[j]) continue;
          if (i !== j && !meet(nodes, 6 * i, nodes, 6 * j, near)) continue;
          stack[waiting++] = i;
          stack[waiting++] = j;
        }
      }
      continue;
    }
    const lastA = leafStart(n, leaves, a + 1);
    const firstB = leafStart(n, leaves, b);
    const lastB = leafStart(n, leaves, b + 1);
    for (let i = leafStart(n, leaves, a); i < lastA; i++) {
      // A box that misses the other leaf misses all in it.
      if (a !== b && !meet(boxes, 6 * i, nodes, 6 * b, near)) continue;
      for (let j = a === b ? i + 1 : firstB; j < lastB; j++) {
        if (groups && groups.items[i] === groups.items[j]) continue;
        if (meet(boxes, 6 * i, boxes, 6 * j, near) && !visit(order[i], order[j])) return false;
      }
    }
  }
  return true;
}

function leafStart(n: number, leaves: number, node: number): number {
  return Math.floor((n * (node - leaves)) / leaves);
}

function meet(p: Float64Array, a: number, q: Float64Array, b: number, near: number): boolean {
  return (
    p[a] <= q[b + 3] + near &&
    q[b] <= p[a + 3] + near &&
    p[a + 1] <= q[b + 4] + near &&
    q[b + 1] <= p[a + 4] + near &&
    p[a + 2] <= q[b + 5] + near &&
    q[b + 2] <= p[a + 5] + near
  );
}

function clear(nodes: Float64Array, node: number): void {
  nodes.fill(Infinity, 6 * node, 6 * node + 3);
  nodes.fill(-Infinity, 6 * node + 3, 6 * node + 6);
}

function widen(to: Float64Array, at: number, from: Float64Array, source: number): void {
  for (let k = 0; k < 3; k++) {
    if (from[source + k] < to[at + k]) to[at + k] = from[source + k];
    if (from[source + 3 + k] > to[at + 3 + k]) to[at + 3 + k] = from[source + 3 + k];
  }
}

function mortonOrder(boxes: Float64Array, n: number): Uint32Array {
  const low = [Infinity, Infinity, Infinity];
  const high = [-Infinity, -Infinity, -Infinity];
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < 3; k++) {
      const twice = boxes[6 * i + k] + boxes[6 * i + 3 + k];
      if (twice < low[k]) low[k] = twice;
      if (twice > high[k]) high[k] = twice;
    }
  }
  const scale = low.map((from, k) => AXIS_CELLS / Math.max(high[k] - from, 1e-300));
  const keys = new Float64Array(n);
  for (let i = 0, o = 0; i < n; i++, o += 6) {
    const x = spread(((boxes[o] + boxes[o + 3] - low[0]) * scale[0]) | 0);
    const y = spread(((boxes[o + 1] + boxes[o + 4] - low[1]) * scale[1]) | 0);
    const z = spread(((boxes[o + 2] + boxes[o + 5] - low[2]) * scale[2]) | 0);
    keys[i] = (x | (y << 1) | (z << 2)) * ITEM_SPAN + i;
  }
  keys.sort();
  const order = new Uint32Array(n);
  for (let i = 0; i < n; i++) order[i] = keys[i] % ITEM_SPAN;
  return order;
}

/** Ten bits, two zeros between each. */
function spread(value: number): number {
  let v = value & 0x3ff;
  v = (v | (v << 16)) & 0x30000ff;
  v = (v | (v << 8)) & 0x300f00f;
  v = (v | (v << 4)) & 0x30c30c3;
  return (v | (v << 2)) & 0x9249249;
}
