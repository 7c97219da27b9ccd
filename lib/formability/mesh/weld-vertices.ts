/** What welding found: vertex ids per corner and, for each vertex, one corner that carries its coordinates. */
export interface Weld {
  index: Uint32Array;
  vertices: number;
  /** 3 × vertices, as stored. */
  coords: Float32Array;
}

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
  for (let i = 0; i < coords.length; i++) if (coords[i] === 0) coords[i] = 0;
  const words = new Int32Array(coords.buffer, coords.byteOffset, coords.length);
  const index = new Uint32Array(corners);
  let capacity = 1 << Math.ceil(Math.log2(Math.max(16, corners / 3)));
  let unique = new Int32Array(capacity * 3);
  let slots = new Int32Array(capacity * 2).fill(-1);
  let mask = slots.length - 1;
  let vertices = 0;
  for (let corner = 0, o = 0; corner < corners; corner++, o += 3) {
    const x = words[o];
    const y = words[o + 1];
    const z = words[o + 2];
    // Files in any sensible order repeat corners of the facet before: three looks spare most of the probing.
    const before = corner - (corner % 3) - 3;
    if (before >= 0) {
      let same = -1;
      for (let c = before; c < before + 3 && same < 0; c++) {
        const at = 3 * c;
        if (words[at] === x && words[at + 1] === y && words[at + 2] === z) same = c;
      }
      if (same >= 0) {
        index[corner] = index[same];
        continue;
      }
    }
    let slot = mix(x, y, z) & mask;
    let found = slots[slot];
    while (found >= 0) {
      const at = 3 * found;
      if (unique[at] === x && unique[at + 1] === y && unique[at + 2] === z) break;
      slot = (slot + 1) & mask;
      found = slots[slot];
    }
    if (found < 0) {
      found = vertices++;
      slots[slot] = found;
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
  return { index, vertices, coords: new Float32Array(unique.buffer, 0, vertices * 3) };
}

function rehash(unique: Int32Array, vertices: number, size: number): Int32Array<ArrayBuffer> {
  const slots = new Int32Array(size).fill(-1);
  for (let v = 0, o = 0; v < vertices; v++, o += 3) {
    let slot = mix(unique[o], unique[o + 1], unique[o + 2]) & (size - 1);
    while (slots[slot] >= 0) slot = (slot + 1) & (size - 1);
    slots[slot] = v;
  }
  return slots;
}
