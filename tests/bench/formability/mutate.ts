import { unzipSync, zipSync } from 'fflate';
import { carved, rectangle } from '../../fixtures/meshes/carved';
import { frustum, lathe } from '../../fixtures/meshes/solids';
import { moved, together } from '../../fixtures/meshes/triangles';
import { componentsXml, meshXml, modelXml, objectXml, packed } from '../../fixtures/meshes/write-3mf';
import { cylindersStep, frustumStep } from '../../fixtures/meshes/write-step';
import { asciiStl, binaryStl } from '../../fixtures/meshes/write-stl';

const mesh = together(
  lathe([[0.5, 0], [30, 0], [26, 25], [14, 25], [11, 8], [0.5, 8]], 12),
  moved(frustum(20, 30, 18, 6), 55, 0, 0),
  moved(carved(rectangle(30, 30), 12, [{ ring: rectangle(10, 10), z: 4, pockets: [{ ring: rectangle(0.8, 0.8), z: 0 }] }]), 0, 60, 0),
); // prettier-ignore

const model = modelXml(
  [objectXml(1, meshXml(mesh)), objectXml(2, componentsXml('objectid="1"', 'objectid="1" transform="0 1 0 -1 0 0 0 0 1 120 0 0"'))],
  ['objectid="2"', 'objectid="1" transform="1 0 0 0 1 0 0 0 1 0 200 0"'],
  'unit="millimeter"',
); // prettier-ignore

const SOURCES = {
  'stl-binary': binaryStl(mesh),
  'stl-ascii': asciiStl(mesh),
  '3mf': packed(model),
  '3mf-text': new TextEncoder().encode(model),
  step: frustumStep(60, 40, 20, 5),
  'step-round': cylindersStep([[0, 0, 20, 30]]),
};
export type FuzzFormat = keyof typeof SOURCES;

export function dice(seed: number): (limit: number) => number {
  let state = seed | 1;
  const roll = (limit: number) => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) % limit;
  };
  for (let i = 0; i < 8; i++) roll(2);
  return roll;
}

/** One of: bytes overwritten, cut off, cut out, doubled, filled with ones, one bit, an odd number, another digit. */
function mutateBytes(source: Uint8Array, roll: (limit: number) => number): Uint8Array {
  let bytes = source.slice();
  for (let n = 1 + roll(3); n > 0 && bytes.length > 0; n--) {
    const at = roll(bytes.length);
    const length = 1 + roll(60);
    const kind = roll(16);
    if (kind === 0) for (let i = at; i < Math.min(bytes.length, at + length); i++) bytes[i] = roll(256);
    else if (kind === 1) bytes = bytes.slice(0, at);
    else if (kind === 2) bytes = spliced(bytes, at, length, 0);
    else if (kind === 3) bytes = spliced(bytes, at, 0, length);
    else if (kind === 4) bytes.fill(255, at, at + 4);
    else if (kind === 5) bytes[at] ^= 1 << roll(8);
    else if (kind === 6 && bytes.length > 134) oddFloat(bytes, roll);
    else if (kind === 7) oddWord(bytes, at, roll);
    else changeDigit(bytes, at, roll);
  }
  return bytes;
}

function spliced(bytes: Uint8Array, at: number, cut: number, again: number): Uint8Array {
  const parts = [
    bytes.subarray(0, at),
    bytes.subarray(Math.max(0, at - again), at),
    bytes.subarray(at + cut),
  ];
  const out = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  parts.reduce((offset, part) => (out.set(part, offset), offset + part.length), 0);
  return out;
}

function oddFloat(bytes: Uint8Array, roll: (limit: number) => number): void {
  const facet = roll(Math.floor((bytes.length - 84) / 50));
  const odd = [0, -0, 1e-30, 1e5, -1e5, 1e6, 25, 8, 0.5, 1 / 3, 3.4e38, NaN][roll(12)];
  new DataView(bytes.buffer).setFloat32(84 + 50 * facet + 12 + 4 * roll(9), odd, true);
}

/** A word that upsets readers, written over what stands there. */
function oddWord(bytes: Uint8Array, at: number, roll: (limit: number) => number): void {
  const words = ['nan', 'inf', '-1', '1e308', '99999999999', '<', '&#0;', ']]>', '<!--', '"', "'", ';', '#1', '()', '\0', 'endsolid']; // prettier-ignore
  const word = new TextEncoder().encode(words[roll(words.length)]);
  bytes.set(word.subarray(0, bytes.length - at), at);
}

/** The next digit of a text becomes another one; in a binary file some byte of that value does. */
function changeDigit(bytes: Uint8Array, from: number, roll: (limit: number) => number): void {
  const at = bytes.findIndex((byte, i) => i >= from && byte >= 48 && byte <= 57);
  if (at >= 0) bytes[at] = 48 + roll(10);
}

/** Case `index`, always the same: half STL, most of the rest 3MF (its archive, or the text in it), some STEP. */
export function mutatedFile(index: number): { bytes: Uint8Array; format: FuzzFormat } {
  const roll = dice(7919 * (index + 1));
  const of100 = roll(100);
  if (of100 < 30) return { bytes: mutateBytes(SOURCES['stl-binary'], roll), format: 'stl-binary' };
  if (of100 < 58) return { bytes: mutateBytes(SOURCES['stl-ascii'], roll), format: 'stl-ascii' };
  if (of100 < 74) return { bytes: mutateBytes(SOURCES['3mf'], roll), format: '3mf' };
  if (of100 < 96) {
    const parts = unzipSync(SOURCES['3mf']);
    const name = roll(8) === 0 ? '_rels/.rels' : '3D/3dmodel.model';
    return {
      bytes: zipSync({ ...parts, [name]: mutateBytes(parts[name], roll) }, { level: 1 }),
      format: '3mf-text',
    };
  }
  const format = of100 < 99 ? 'step' : 'step-round';
  return { bytes: mutateBytes(SOURCES[format], roll), format };
}
