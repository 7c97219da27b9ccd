import { CREASE_DEG, type SplitMesh } from './split-vertices';

const CREASE_COS = Math.cos((CREASE_DEG * Math.PI) / 180);
/** Vertex normals nearer than 20° shade as one surface. */
const SHADE_COS = Math.cos((20 * Math.PI) / 180);
/** More lines than this are a texture, not a drawing: printed-like steps and scan noise would be inked black. */
const MOST_LINES = 60_000;

/** A triangle narrower than this many counts of the 16-bit grid (1/6500 of the longest side) is a sliver. */
const SLIVER_COUNTS = 10;

/** Pairs of vertices: the edges between facets that meet sharply, and open ones; drawn as ink lines. */
export function findCreaseEdges(mesh: SplitMesh, index: Uint32Array): Uint32Array {
  const edges = index.length;
  let size = 1024;
  while (size < edges * 2) size *= 2;
  const mask = size - 1;
  const table = new Int32Array(size).fill(-1);
  // Per edge: the corner that made it first, and how it stands (0 seen once, 1 smooth pair, 2 sharp).
  const firstCorner = new Uint32Array(edges);
  const state = new Uint8Array(edges);
  const normals = unitNormals(mesh, index);
  let found = 0;
  for (let c = 0; c < index.length; c++) {
    const next = nextCorner(c);
    const p = mesh.place[index[c]];
    const q = mesh.place[index[next]];
    const low = Math.min(p, q);
    const high = Math.max(p, q);
    let h = (Math.imul(low, 0x9e3779b1) ^ Math.imul(high, 0x85ebca6b)) >>> 0;
    h = (h ^ (h >>> 15)) & mask;
    for (;;) {
      const e = table[h];
      if (e < 0) {
        table[h] = found;
        firstCorner[found++] = c;
        break;
      }
      const [a, b] = endPlaces(mesh, index, firstCorner[e]);
      if (Math.min(a, b) === low && Math.max(a, b) === high) {
        state[e] = state[e] === 0 && smooth(mesh, index, normals, firstCorner[e], c) ? 1 : 2;
        break;
      }
      h = (h + 1) & mask;
    }
  }
  const pairs: number[] = [];
  for (let e = 0; e < found; e++) {
    if (state[e] === 1) continue;
    const c = firstCorner[e];
    pairs.push(index[c], index[nextCorner(c)]);
  }
  const isDrawing = mesh.draftSplitDeg < 180 && pairs.length / 2 <= MOST_LINES;
  return isDrawing ? Uint32Array.from(pairs) : new Uint32Array(0);
}

function endPlaces(mesh: SplitMesh, index: Uint32Array, c: number): [number, number] {
  return [mesh.place[index[c]], mesh.place[index[nextCorner(c)]]];
}

/**
 * A pair that is no edge to draw: it meets flatly, one of the two is a sliver whose normal says nothing, or the shading
 * runs on over it at one of its ends (a chance fold of the simplifier).
 */
function smooth(
  mesh: SplitMesh,
  index: Uint32Array,
  facets: Float32Array,
  corner: number,
  other: number,
): boolean {
  const a = ((corner / 3) | 0) * 3;
  const b = ((other / 3) | 0) * 3;
  const sliver = (t: number) => facets[t] === 0 && facets[t + 1] === 0 && facets[t + 2] === 0;
  if (sliver(a) || sliver(b) || dot(facets, a, b) >= CREASE_COS) return true;
  const [p, q] = [index[corner], index[nextCorner(corner)]];
  const [r, s] = [index[other], index[nextCorner(other)]];
  const [atP, atQ] = mesh.place[r] === mesh.place[p] ? [r, s] : [s, r];
  return dot(mesh.normals, p * 3, atP * 3) >= SHADE_COS || dot(mesh.normals, q * 3, atQ * 3) >= SHADE_COS;
}

function nextCorner(corner: number): number {
  return corner % 3 === 2 ? corner - 2 : corner + 1;
}

function dot(v: Float32Array, i: number, j: number): number {
  return v[i] * v[j] + v[i + 1] * v[j + 1] + v[i + 2] * v[j + 2];
}

/** Unit normals, three numbers a triangle; 0 for slivers. */
function unitNormals({ grid, place }: SplitMesh, index: Uint32Array): Float32Array {
  const normals = new Float32Array(index.length);
  for (let i = 0; i < index.length; i += 3) {
    const [a, b, c] = [place[index[i]] * 3, place[index[i + 1]] * 3, place[index[i + 2]] * 3];
    const [ux, uy, uz] = [grid[b] - grid[a], grid[b + 1] - grid[a + 1], grid[b + 2] - grid[a + 2]];
    const [vx, vy, vz] = [grid[c] - grid[a], grid[c + 1] - grid[a + 1], grid[c + 2] - grid[a + 2]];
    const [x, y, z] = [uy * vz - uz * vy, uz * vx - ux * vz, ux * vy - uy * vx];
    const length = Math.hypot(x, y, z);
    const longest = Math.sqrt(
      Math.max(length2(ux, uy, uz), length2(vx, vy, vz), length2(ux - vx, uy - vy, uz - vz)),
    );
    if (length < longest * SLIVER_COUNTS) continue;
    normals[i] = x / length;
    normals[i + 1] = y / length;
    normals[i + 2] = z / length;
  }
  return normals;
}

function length2(x: number, y: number, z: number): number {
  return x * x + y * y + z * z;
}
