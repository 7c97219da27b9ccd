export interface Surface {
  positions: Float32Array;
  normals: Float32Array;
  flags: Float32Array;
  index: Uint32Array;
}

/** Passes of halving: an edge of 600 mm comes down to 2 mm in nine. */
const MOST_PASSES = 10;
const MOST_TRIANGLES = 600_000;

/**
 * The same surface with no edge longer than asked for, as far as a browser can bear: a figure that varies over a plane
 * wall cannot be told by the wall's four corners. Edges are halved by their length alone, so neighbours stay joined.
 * A corner keeps its flags only where both ends of the halved edge have them.
 */
export function refineSurface({ positions, normals, flags, index }: Surface, longestMm: number): Surface {
  const p = Array.from(positions);
  const n = Array.from(normals);
  const f = Array.from(flags);
  let corners: Uint32Array | number[] = index;
  for (let pass = 0; pass < MOST_PASSES; pass++) {
    const halved = new Map<number, number>();
    const middle = (a: number, b: number): number | null => {
      const [low, high] = a < b ? [a, b] : [b, a];
      const long = Math.hypot(p[3 * a] - p[3 * b], p[3 * a + 1] - p[3 * b + 1], p[3 * a + 2] - p[3 * b + 2]);
      if (long <= longestMm) return null;
      const key = low * 2 ** 26 + high;
      const known = halved.get(key);
      if (known !== undefined) return known;
      const made = f.length;
      for (let k = 0; k < 3; k++) {
        p.push((p[3 * a + k] + p[3 * b + k]) / 2);
        n.push((n[3 * a + k] + n[3 * b + k]) / 2);
      }
      f.push(f[a] & f[b]);
      halved.set(key, made);
      return made;
    };
    const next: number[] = [];
    for (let c = 0; c < corners.length; c += 3) {
      const [a, b, d] = [corners[c], corners[c + 1], corners[c + 2]];
      split(next, [a, b, d], [middle(a, b), middle(b, d), middle(d, a)]);
    }
    corners = next;
    if (halved.size === 0 || corners.length / 3 > MOST_TRIANGLES) break;
  }
  return {
    positions: Float32Array.from(p),
    normals: Float32Array.from(n),
    flags: Float32Array.from(f),
    index: Uint32Array.from(corners),
  };
}

type Three<T> = [T, T, T];

/** The triangles that take a triangle's place, by which of its edges were halved. */
function split(out: number[], [a, b, c]: Three<number>, [ab, bc, ca]: Three<number | null>): void {
  if (ab !== null && bc !== null && ca !== null) out.push(a, ab, ca, ab, b, bc, ca, bc, c, ab, bc, ca);
  else if (ab === null && bc === null && ca === null) out.push(a, b, c);
  // Turned so that the first edge is halved, and the last is not.
  else if (ab === null || ca !== null) split(out, [b, c, a], [bc, ca, ab]);
  else if (bc === null) out.push(a, ab, c, ab, b, c);
  else out.push(a, ab, c, ab, bc, c, ab, b, bc);
}
