import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import { UnusableInput } from '@/lib/formability/unusable-input';
import { frustum, lathe } from '../../fixtures/meshes/solids';
import { together, moved } from '../../fixtures/meshes/triangles';
import { asciiStl, binaryStl } from '../../fixtures/meshes/write-stl';

/** Numbers below `limit` from a seed (xorshift). */
function dice(seed: number): (limit: number) => number {
  let state = seed;
  return (limit) => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) % limit;
  };
}

const mesh = together(
  lathe([[0.5, 0], [30, 0], [26, 25], [14, 25], [11, 8], [0.5, 8]], 12),
  moved(frustum(20, 30, 18, 6), 55, 0, 0),
); // prettier-ignore

/** One to four of: bytes overwritten, cut off, cut out, doubled, filled with ones, a coordinate set to an odd value,
 * a digit changed. */
function mutate(source: Uint8Array, roll: (limit: number) => number): Uint8Array {
  let bytes = source.slice();
  for (let n = 1 + roll(4); n > 0 && bytes.length > 0; n--) {
    const at = roll(bytes.length);
    const length = 1 + roll(60);
    const kind = roll(12);
    if (kind === 0) for (let i = at; i < Math.min(bytes.length, at + length); i++) bytes[i] = roll(256);
    else if (kind === 1) bytes = bytes.slice(0, at);
    else if (kind === 2) bytes = Uint8Array.from([...bytes.slice(0, at), ...bytes.slice(at + length)]);
    else if (kind === 3)
      bytes = Uint8Array.from([...bytes.slice(0, at), ...bytes.slice(Math.max(0, at - length))]);
    else if (kind === 4) bytes.fill(255, at, at + 4);
    else if (kind === 5 && bytes.length > 134) {
      const facet = roll(Math.floor((bytes.length - 84) / 50));
      const odd = [0, -0, 1e-30, 1e5, -1e5, 1e6, 25, 8, 0.5, 1 / 3][roll(10)];
      new DataView(bytes.buffer).setFloat32(84 + 50 * facet + 12 + 4 * roll(9), odd, true);
    } else if (kind === 6) bytes[at] ^= 1 << roll(8);
    else changeDigit(bytes, at, roll);
  }
  return bytes;
}

/** The next digit of a text becomes another one; in a binary file some byte of that value does. */
function changeDigit(bytes: Uint8Array, from: number, roll: (limit: number) => number): void {
  const at = bytes.findIndex((byte, i) => i >= from && byte >= 48 && byte <= 57);
  if (at >= 0) bytes[at] = 48 + roll(10);
}

describe.each([
  ['binary', binaryStl(mesh), 41],
  ['ASCII', asciiStl(mesh), 42],
])('mutated %s files (xorshift seeds: binary 41, ASCII 42)', (_, source, seed) => {
  it('end in a report of finite figures or in a refusal, never otherwise', () => {
    const roll = dice(seed);
    let reports = 0;
    let refusals = 0;
    for (let n = 0; n < 150; n++) {
      const bytes = mutate(source, roll);
      try {
        const { report } = analyse(bytes, { grid: { cellMm: 2 } });
        expect(JSON.stringify(report, (_key, value: unknown) => (typeof value === 'number' && !Number.isFinite(value) ? 'BAD' : value)), `mutation ${n}`).not.toContain('BAD'); // prettier-ignore
        reports++;
      } catch (error) {
        if (!(error instanceof UnusableInput))
          throw new Error(`mutation ${n}: ${String(error)}`, { cause: error });
        expect(error.message).not.toContain('\n');
        refusals++;
      }
    }
    expect(reports).toBeGreaterThan(20);
    expect(refusals).toBeGreaterThan(20);
  });
});
