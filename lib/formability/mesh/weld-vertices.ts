/** What welding found: vertex ids per corner and, for each vertex, one corner that carries its coordinates. */
export interface Weld {
  index: Uint32Array;
  vertices: number;
  /** 3 × vertices, as stored. */
  coords: Float32Array;
}

/** The word of −0. */
const MINUS_ZERO = -0x80000000;

function mix(a: number, b: number, c: number): number {
  let h = Math.imul(a, 0x9e3779b1) ^ Math.imul(b, 0x85ebca6b) ^ Math.imul(c, 0xc2b2ae35);
  h ^= h >>> 15;
  h = Math.imul(h, 0x2c1b3c6d);
  h ^= h >>> 13;
  return h;
}

/**
 * Welds bit-identical corners (−0 and 0 are one) by open addressing on the three words.
 * @param coords 9 × triangles
 */
export function weldVertices(coords: Float32Array): Weld {
  const corners = coords.length / 3;
  const words = new Int32Array(coords.buffer, coords.byteOffset, coords.length);
  const index = new Uint32Array(corners);
  let capacity = 1 << Math.ceil(Math.log2(Math.max(16, corners / 3)));
  let unique = new Int32Array(capacity * 3);
  // Vertex number plus one, 0 where a slot is free.
  let slots = new Int32Array(capacity * 2);
  let mask = slots.length - 1;
  let vertices = 0;
  // The vertex after the one that was found last: files in rows come upon a row's vertices in their order.
  let guess = 0;
  for (let corner = 0, before = -3; corner < corners; before += 3) {
    for (const end = corner + 3; corner < end; corner++) {
      const o = 3 * corner;
      let x = words[o];
      let y = words[o + 1];
      let z = words[o + 2];
      // Files in any sensible order repeat corners of the facet before: three looks spare most of the probing.
      if (before >= 0) {
        const b = 3 * before;
        const same =
          words[b] === x && words[b + 1] === y && words[b + 2] === z
            ? before
            : words[b + 3] === x && words[b + 4] === y && words[b + 5] === z
              ? before + 1
              : words[b + 6] === x && words[b + 7] === y && words[b + 8] === z
                ? before + 2
                : -1;
        if (same >= 0) {
          index[corner] = index[same];
          continue;
        }
      }
      if (x === MINUS_ZERO) x = 0;
      if (y === MINUS_ZERO) y = 0;
      if (z === MINUS_ZERO) z = 0;
      const g = 3 * guess;
      if (guess < vertices && unique[g] === x && unique[g + 1] === y && unique[g + 2] === z) {
        index[corner] = guess++;
        continue;
      }
      let slot = mix(x, y, z) & mask;
      let found = slots[slot] - 1;
      while (found >= 0) {
        const at = 3 * found;
        if (unique[at] === x && unique[at + 1] === y && unique[at + 2] === z) break;
        slot = (slot + 1) & mask;
        found = slots[slot] - 1;
      }
      if (found >= 0) guess = found + 1;
      else {
        found = vertices++;
        slots[slot] = vertices;
        unique[3 * found] = x;
        unique[3 * found + 1] = y;
        unique[3 * found + 2] = z;
        if (vertices === capacity) {
          capacity *= 2;
          const wider = new Int32Array(capacity * 3);
          wider.set(unique);
          unique = wider;
          slots = rehash(unique, vertices, capacity * 2);
          mask = slots.length - 1;
        }
      }
      index[corner] = found;
    }
  }
  return { index, vertices, coords: new Float32Array(unique.buffer, 0, vertices * 3) };
}

function rehash(unique: Int32Array, vertices: number, size: number): Int32Array<ArrayBuffer> {
  const slots = new Int32Array(size);
  for (let v = 0, o = 0; v < vertices; v++, o += 3) {
    let slot = mix(unique[o], unique[o + 1], unique[o + 2]) & (size - 1);
    while (slots[slot] > 0) slot = (slot + 1) & (size - 1);
    slots[slot] = v + 1;
  }
  return slots;
}
