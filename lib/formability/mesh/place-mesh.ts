import type { Point } from '../report';
import type { Mesh } from './mesh';
import type { Weld } from './weld-vertices';

export interface Placing {
  mmPerUnit: number;
  up: [number, number, number];
  dropToBed: boolean;
}

/** The mesh in the engine's frame, and how high it stood over the bed before it was dropped. */
export interface Placed {
  mesh: Mesh;
  min: Point;
  max: Point;
  /** Lowest z before dropping: above 0 floating, below 0 sunk. */
  zBeforeDrop: number;
  /** Largest absolute coordinate in millimetres, for the warning `precision`. */
  reach: number;
  /** Rows of the turn from the file's frame, null where nothing was turned. */
  turn: number[] | null;
}

/** Scales to millimetres, turns `up` to +Z by the least turn, drops to the bed and recentres x and y. */
export function placeMesh(weld: Weld, placing: Placing): Placed {
  const turn = turnToUp(placing.up);
  const { vertices, coords } = weld;
  const position = new Float64Array(vertices * 3);
  const min: Point = [Infinity, Infinity, Infinity];
  const max: Point = [-Infinity, -Infinity, -Infinity];
  let reach = 0;
  for (let i = 0; i < position.length; i += 3) {
    const x = coords[i] * placing.mmPerUnit;
    const y = coords[i + 1] * placing.mmPerUnit;
    const z = coords[i + 2] * placing.mmPerUnit;
    for (let k = 0; k < 3; k++) {
      const value = turn
        ? turn[3 * k] * x + turn[3 * k + 1] * y + turn[3 * k + 2] * z
        : k === 0
          ? x
          : k === 1
            ? y
            : z;
      position[i + k] = value;
      if (value < min[k]) min[k] = value;
      if (value > max[k]) max[k] = value;
    }
    reach = Math.max(reach, Math.abs(x), Math.abs(y), Math.abs(z));
  }
  const zBeforeDrop = min[2];
  const drop = placing.dropToBed ? min[2] : 0;
  const centre: [number, number] = [(min[0] + max[0]) / 2, (min[1] + max[1]) / 2];
  for (let i = 0; i < position.length; i += 3) {
    position[i] -= centre[0];
    position[i + 1] -= centre[1];
    position[i + 2] -= drop;
  }
  min[2] -= drop;
  max[2] -= drop;
  const mesh: Mesh = { triangles: weld.index.length / 3, vertices, index: weld.index, position, centre };
  return { mesh, min, max, zBeforeDrop, reach, turn };
}

/** A point of the file, x and y in the turned file's frame, z above the bed: the frame of places in the report. */
export function placePoint(
  at: readonly [number, number, number],
  placing: Placing,
  { turn, zBeforeDrop }: Pick<Placed, 'turn' | 'zBeforeDrop'>,
): Point {
  const mm = at.map((value) => value * placing.mmPerUnit);
  const [x, y, z] = turn
    ? [0, 3, 6].map((row) => turn[row] * mm[0] + turn[row + 1] * mm[1] + turn[row + 2] * mm[2])
    : mm;
  return [x, y, placing.dropToBed ? z - zBeforeDrop : z];
}

/** Rows of the rotation that takes `up` to +Z by the shortest way; null where nothing turns. */
export function turnToUp(up: readonly [number, number, number]): number[] | null {
  const length = Math.hypot(...up);
  const [x, y, z] = up.map((value) => value / length);
  if (z > 1 - 1e-12) return null;
  if (z < -1 + 1e-12) return [1, 0, 0, 0, -1, 0, 0, 0, -1];
  const k = 1 / (1 + z);
  const exact = [1 - k * x * x, -k * x * y, -x, -k * x * y, 1 - k * y * y, -y, x, y, z];
  return exact.map((value) => (Math.abs(value - Math.round(value)) < 1e-12 ? Math.round(value) : value));
}
