import { strFromU8, strToU8, unzipSync, zipSync } from 'fflate';
import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import { UnusableInput } from '@/lib/formability/unusable-input';
import { frustum } from '../../../../fixtures/meshes/solids';
import { moved } from '../../../../fixtures/meshes/triangles';
import {
  componentsXml,
  meshXml,
  modelXml,
  objectXml,
  packed,
  START,
} from '../../../../fixtures/meshes/write-3mf';
import { dice } from '../../dice';

const source = packed(
  modelXml(
    [
      objectXml(1, meshXml(frustum(60, 40, 20, 5)), 'name="body"'),
      objectXml(2, componentsXml('objectid="1"', 'objectid="1" transform="1 0 0 0 1 0 0 0 1 90 0 0"')),
    ],
    ['objectid="2"', 'p:path="/3D/far.model" objectid="4" transform="0 1 0 -1 0 0 0 0 1 0 80 0"'],
  ),
  { '3D/far.model': strToU8(modelXml([objectXml(4, meshXml(moved(frustum(20, 30, 18, 6), 9, 0, 0)))], [])) },
);
const files = unzipSync(source);

const WORDS = ['<', '>', '/>', '"', ' ', '-', '0', '1', '7', '.', 'e9', 'NaN', '1e309', '999999', '-1', '<!--', '<!DOCTYPE a>', '&amp;', '&x;', 'vertex', 'triangle', 'mesh', 'inch', 'other', '\u0000']; // prettier-ignore

/** The model's text changed in one to three places and packed again: what lies beyond the archive is reached. */
function mutateText(roll: (limit: number) => number): Uint8Array {
  const name = [START, '3D/far.model', '_rels/.rels'][Math.max(0, roll(8) - 5)];
  let text = strFromU8(files[name]);
  for (let k = 1 + roll(3); k > 0; k--) {
    const at = roll(text.length);
    const kind = roll(4);
    if (kind === 0) text = text.slice(0, at) + text.slice(at + 1 + roll(30));
    else if (kind === 1) text = text.slice(0, at) + text.slice(Math.max(0, at - roll(60)));
    else if (kind === 2) text = text.slice(0, at) + WORDS[roll(WORDS.length)] + text.slice(at + roll(3));
    else text = text.replace(/\d+(?=")/g, (found) => (roll(60) === 0 ? WORDS[6 + roll(9)] : found));
  }
  return zipSync({ ...files, [name]: strToU8(text) }, { level: 1 });
}

/** The archive's own bytes changed in one to four places. */
function mutateBytes(roll: (limit: number) => number): Uint8Array {
  let bytes = source.slice();
  for (let k = 1 + roll(4); k > 0; k--) {
    // Half of them near the end, where the directory lies.
    const at = roll(2) === 0 ? roll(bytes.length) : Math.max(0, bytes.length - 1 - roll(420));
    const kind = roll(5);
    if (kind === 0) bytes[at] ^= 1 << roll(8);
    else if (kind === 1) bytes.fill(255, at, at + 4);
    else if (kind === 2) bytes.fill(0, at, at + 2);
    else if (kind === 3) bytes = bytes.slice(0, at);
    else bytes = new Uint8Array([...bytes.slice(0, at), ...bytes.slice(at + 1 + roll(30))]);
  }
  return bytes;
}

describe.each([
  ['text', mutateText, 51],
  ['archive', mutateBytes, 52],
])('3MF files mutated in their %s (xorshift seeds: text 51, archive 52)', (_, mutate, seed) => {
  it('end in a report of finite figures or in a refusal, never otherwise', () => {
    const roll = dice(seed);
    const ends = new Map<string, number>();
    for (let n = 0; n < 300; n++) {
      const bytes = mutate(roll);
      let end = 'report';
      try {
        const { report } = analyse(bytes, { grid: { cellMm: 4 } });
        const figures = JSON.stringify(report, (_key, value: unknown) =>
          typeof value === 'number' && !Number.isFinite(value) ? 'BAD' : value,
        );
        expect(figures, `mutation ${n}`).not.toContain('BAD');
      } catch (error) {
        if (!(error instanceof UnusableInput))
          throw new Error(`mutation ${n}: ${String(error)}`, { cause: error });
        expect(error.message).not.toContain('\n');
        expect(error.message.length).toBeLessThan(600);
        end = error.code;
      }
      ends.set(end, (ends.get(end) ?? 0) + 1);
    }
    const reports = ends.get('report') ?? 0;
    expect(reports).toBeGreaterThan(5);
    expect(reports).toBeLessThan(200);
    expect(ends.size).toBeGreaterThan(3);
  });
});
