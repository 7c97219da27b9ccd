/** Source points that are checked; evenly spread over the list, the same ones every time. */
const SAMPLES = 20_000;

/**
 * Greatest distance, mm, of sampled source points from a simplified surface on the same vertices.
 * `points`: three numbers a place; `index`: corners as vertices; `place`: place of each vertex.
 */
export function measureDeviation(points: Float32Array, index: Uint32Array, place: Uint32Array): number {
  const count = points.length / 3;
  const used = new Uint8Array(count);
  const corner = new Uint32Array(index.length);
  for (let i = 0; i < index.length; i++) {
    corner[i] = place[index[i]];
    used[corner[i]] = 1;
  }
  const grid = new TriangleGrid(points, corner);
  const stride = Math.max(1, Math.floor(count / SAMPLES));
  let worst = 0;
  for (let p = 0; p < count; p += stride) {
    if (used[p]) continue;
    worst = Math.max(worst, grid.distance(points[p * 3], points[p * 3 + 1], points[p * 3 + 2], worst));
  }
  return worst;
}

/** Triangles by the cells of a plan grid that their plan boxes touch. */
class TriangleGrid {
  private readonly n: number;
  private readonly cell: number;
  private readonly start: Uint32Array;
  private readonly list: Uint32Array;

  constructor(
    private readonly points: Float32Array,
    private readonly corner: Uint32Array,
  ) {
    let span = 0;
    for (let i = 0; i < points.length; i++) if (i % 3 < 2) span = Math.max(span, points[i]);
    this.n = Math.max(1, Math.min(512, Math.round(Math.sqrt(corner.length / 6))));
    this.cell = span / this.n || 1;
    this.start = new Uint32Array(this.n * this.n + 1);
    this.eachCell((c) => this.start[c + 1]++);
    for (let c = 0; c < this.n * this.n; c++) this.start[c + 1] += this.start[c];
    const fill = this.start.slice();
    this.list = new Uint32Array(this.start[this.n * this.n]);
    this.eachCell((c, t) => (this.list[fill[c]++] = t));
  }

  private eachCell(visit: (cell: number, triangle: number) => void) {
    const { points: p, corner } = this;
    for (let t = 0; t < corner.length; t += 3) {
      const a = corner[t] * 3;
      const b = corner[t + 1] * 3;
      const c = corner[t + 2] * 3;
      const x0 = this.at(Math.min(p[a], p[b], p[c]));
      const x1 = this.at(Math.max(p[a], p[b], p[c]));
      const y0 = this.at(Math.min(p[a + 1], p[b + 1], p[c + 1]));
      const y1 = this.at(Math.max(p[a + 1], p[b + 1], p[c + 1]));
      for (let y = y0; y <= y1; y++) for (let x = x0; x <= x1; x++) visit(y * this.n + x, t);
    }
  }

  private at(v: number): number {
    return Math.max(0, Math.min(this.n - 1, Math.floor(v / this.cell)));
  }

  /** Distance to the nearest triangle; may stop early once it is known not to exceed `enough`. */
  distance(x: number, y: number, z: number, enough: number): number {
    const cx = this.at(x);
    const cy = this.at(y);
    let best = Infinity;
    for (let ring = 0; ring < this.n; ring++) {
      // Cells of this ring are at least (ring - 1) cells away in plan.
      if (best <= enough || best <= (ring - 1) * this.cell) break;
      for (let j = cy - ring; j <= cy + ring; j++) {
        if (j < 0 || j >= this.n) continue;
        const full = j === cy - ring || j === cy + ring;
        for (let i = cx - ring; i <= cx + ring; i += full ? 1 : Math.max(1, 2 * ring)) {
          if (i < 0 || i >= this.n) continue;
          const c = j * this.n + i;
          for (let k = this.start[c]; k < this.start[c + 1]; k++) {
            best = Math.min(best, this.toTriangle(this.list[k], x, y, z));
          }
        }
      }
    }
    return best;
  }

  private toTriangle(t: number, x: number, y: number, z: number): number {
    const p = this.points;
    const [a, b, c] = [this.corner[t] * 3, this.corner[t + 1] * 3, this.corner[t + 2] * 3];
    return Math.sqrt(
      pointTriangle2(
        x - p[a],
        y - p[a + 1],
        z - p[a + 2],
        p[b] - p[a],
        p[b + 1] - p[a + 1],
        p[b + 2] - p[a + 2],
        p[c] - p[a],
        p[c + 1] - p[a + 1],
        p[c + 2] - p[a + 2],
      ),
    );
  }
}

/** Squared distance of a point to a triangle, all relative to its first corner: inside by barycentrics, else the edges. */
function pointTriangle2(
  px: number,
  py: number,
  pz: number,
  ux: number,
  uy: number,
  uz: number,
  vx: number,
  vy: number,
  vz: number,
): number {
  const uu = ux * ux + uy * uy + uz * uz;
  const vv = vx * vx + vy * vy + vz * vz;
  const uv = ux * vx + uy * vy + uz * vz;
  const pu = px * ux + py * uy + pz * uz;
  const pv = px * vx + py * vy + pz * vz;
  const det = uu * vv - uv * uv;
  if (det > 0) {
    const s = (vv * pu - uv * pv) / det;
    const t = (uu * pv - uv * pu) / det;
    if (s >= 0 && t >= 0 && s + t <= 1)
      return length2(px - s * ux - t * vx, py - s * uy - t * vy, pz - s * uz - t * vz);
  }
  return Math.min(
    pointEdge2(px, py, pz, ux, uy, uz),
    pointEdge2(px, py, pz, vx, vy, vz),
    pointEdge2(px - ux, py - uy, pz - uz, vx - ux, vy - uy, vz - uz),
  );
}

function pointEdge2(px: number, py: number, pz: number, ex: number, ey: number, ez: number): number {
  const ee = ex * ex + ey * ey + ez * ez;
  const s = ee > 0 ? Math.min(1, Math.max(0, (px * ex + py * ey + pz * ez) / ee)) : 0;
  return length2(px - s * ex, py - s * ey, pz - s * ez);
}

function length2(x: number, y: number, z: number): number {
  return x * x + y * y + z * z;
}
