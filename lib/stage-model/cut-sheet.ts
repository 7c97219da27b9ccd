import type { SectionLine, SectionPoint } from './section';

export interface CutSheet {
  /** three numbers a node, mm */
  positions: Float32Array;
  index: Uint32Array;
  thicknessMm: Float32Array;
}

/** A run of the formed sheet along a cut: its template side, point by point from one end to the other. */
export interface SheetRun {
  points: SectionPoint[];
  thicknessMm: number[];
}

interface Crossing {
  point: SectionPoint;
  thicknessMm: number;
  /** crossings that a triangle joins to this one */
  next: number[];
}

/**
 * The sheet along a vertical cut, as runs from edge to edge of the frame. Each crossing lies on an edge of the mesh and
 * is shared by the triangles there, so runs hang together however the sheet folds. Points go along +x (+y).
 */
export function cutSheet(
  { positions: p, index, thicknessMm }: CutSheet,
  { axis, atMm }: SectionLine,
): SheetRun[] {
  const [across, along] = axis === 'y' ? [1, 0] : [0, 1];
  const crossings = new Map<number, Crossing>();
  const nodes = thicknessMm.length;
  const cross = (a: number, b: number): number | null => {
    const [low, high] = a < b ? [a, b] : [b, a];
    const [from, to] = [p[3 * low + across] - atMm, p[3 * high + across] - atMm];
    // A node on the plane counts as beyond it, so that each triangle meets the plane in two edges or none.
    if (from < 0 === to < 0) return null;
    const key = low * nodes + high;
    if (!crossings.has(key)) {
      const t = from / (from - to);
      const mix = (u: number, v: number) => u + t * (v - u);
      crossings.set(key, {
        point: [mix(p[3 * low + along], p[3 * high + along]), mix(p[3 * low + 2], p[3 * high + 2])],
        thicknessMm: mix(thicknessMm[low], thicknessMm[high]),
        next: [],
      });
    }
    return key;
  };
  for (let c = 0; c < index.length; c += 3) {
    const [i, j, k] = [index[c], index[c + 1], index[c + 2]];
    const met = [cross(i, j), cross(j, k), cross(k, i)].filter((key) => key !== null);
    if (met.length !== 2) continue;
    crossings.get(met[0])!.next.push(met[1]);
    crossings.get(met[1])!.next.push(met[0]);
  }
  return follow(crossings);
}

/** Runs from their ends; what closes on itself has none and is no sheet in a frame. */
function follow(crossings: Map<number, Crossing>): SheetRun[] {
  const seen = new Set<number>();
  const runs: SheetRun[] = [];
  for (const [start, first] of crossings) {
    if (seen.has(start) || first.next.length !== 1) continue;
    const run: SheetRun = { points: [], thicknessMm: [] };
    let key: number | undefined = start;
    while (key !== undefined) {
      seen.add(key);
      const at: Crossing = crossings.get(key)!;
      run.points.push(at.point);
      run.thicknessMm.push(at.thicknessMm);
      key = at.next.find((other) => !seen.has(other));
    }
    if (run.points[0][0] > run.points[run.points.length - 1][0]) {
      run.points.reverse();
      run.thicknessMm.reverse();
    }
    runs.push(run);
  }
  return runs;
}

/** The outer side of a run, its thickness drawn `times` as thick: each point moved along the mean of its two normals. */
export function outerSide({ points, thicknessMm }: SheetRun, times: number): SectionPoint[] {
  return points.map(([u, z], i) => {
    const [a, b] = [points[Math.max(0, i - 1)], points[Math.min(points.length - 1, i + 1)]];
    const [du, dz] = [b[0] - a[0], b[1] - a[1]];
    const length = Math.hypot(du, dz) || 1;
    const by = (thicknessMm[i] * times) / length;
    return [u - dz * by, z + du * by];
  });
}
