import { constants, crc32, deflateRawSync } from 'node:zlib';
import { strToU8, zipSync } from 'fflate';
import { describe, expect, it } from 'vitest';
import { inspect } from '@/lib/formability/inspect';
import { MAX_TAG_BYTES } from '@/lib/formability/parse/3mf/limits';
import { frustum } from '../../../../fixtures/meshes/solids';
import {
  componentsXml,
  meshXml,
  modelXml,
  objectXml,
  packed,
  plain3mf,
  relationsXml,
  START,
} from '../../../../fixtures/meshes/write-3mf';
import { refusal } from '../../run-engine';

const mesh = meshXml(frustum(60, 40, 20, 5));
const one = objectXml(1, mesh);
const good = plain3mf(frustum(60, 40, 20, 5));
const withModel = (change: (text: string) => string) => packed(change(modelXml([one])));
const swapped = (from: string | RegExp, to: string) => withModel((text) => text.replace(from, to));
const cut = (share: number) => good.slice(0, Math.floor(good.length * share));

/** Bytes of the archive changed at every place where a record of this signature begins. */
function patched(
  bytes: Uint8Array,
  signature: number,
  patch: (view: DataView, at: number) => void,
): Uint8Array {
  const copy = bytes.slice();
  const view = new DataView(copy.buffer);
  for (let at = 0; at + 4 <= copy.length; at++) if (view.getUint32(at, true) === signature) patch(view, at);
  return copy;
}
const CENTRAL = 0x02014b50;
const LOCAL = 0x04034b50;
const END = 0x06054b50;
/** The directory's entry of the model part, the third of three. */
const inModel = (patch: (view: DataView, at: number) => void) => {
  let seen = 0;
  return patched(good, CENTRAL, (view, at) => {
    if (++seen === 3) patch(view, at);
  });
};

/**
 * A 3MF whose model goes on for so many megabytes of blanks: one packed megabyte, written again and again. A full
 * flush ends it on a byte and lets the next one stand by itself.
 */
function blankBomb(megabytes: number): Uint8Array {
  const flushed = (bytes: Uint8Array) =>
    deflateRawSync(bytes, { level: 9, finishFlush: constants.Z_FULL_FLUSH });
  const head = strToU8(modelXml([one]).replace(/<resources>[\s\S]*/, '<resources>'));
  const blanks = flushed(new Uint8Array(1e6).fill(32));
  const packedModel = Buffer.concat([flushed(head), ...Array.from({ length: megabytes }, () => blanks), Buffer.of(3, 0)]); // prettier-ignore
  const relations = strToU8(relationsXml());
  return zipRaw([
    { name: '_rels/.rels', method: 0, bytes: relations, unpacked: relations.length, crc: crc32(relations) },
    { name: START, method: 8, bytes: packedModel, unpacked: head.length + megabytes * 1e6, crc: 0 },
  ]);
}

/** An archive of packed bytes as they are given. */
function zipRaw(files: { name: string; method: number; bytes: Uint8Array; unpacked: number; crc: number }[]) {
  const parts: Buffer[] = [];
  const directory: Buffer[] = [];
  let at = 0;
  for (const { name, method, bytes, unpacked, crc } of files) {
    const title = Buffer.from(name);
    const common = Buffer.alloc(26);
    common.writeUInt16LE(20, 0);
    common.writeUInt16LE(method, 4);
    common.writeUInt32LE(crc, 10);
    common.writeUInt32LE(bytes.length, 14);
    common.writeUInt32LE(unpacked, 18);
    common.writeUInt16LE(title.length, 22);
    const place = Buffer.alloc(14);
    place.writeUInt32LE(at, 10);
    directory.push(Buffer.of(0x50, 0x4b, 1, 2, 20, 0), common, place, title);
    parts.push(Buffer.of(0x50, 0x4b, 3, 4), common, title, Buffer.from(bytes));
    at += 30 + title.length + bytes.length;
  }
  const end = Buffer.alloc(22);
  end.writeUInt32LE(END, 0);
  end.writeUInt16LE(files.length, 8);
  end.writeUInt16LE(files.length, 10);
  end.writeUInt32LE(Buffer.concat(directory).length, 12);
  end.writeUInt32LE(at, 16);
  return new Uint8Array(Buffer.concat([...parts, ...directory, end]));
}

/** The model part's packed bytes begun with a block of a kind that deflate does not have. */
function damaged(): Uint8Array {
  let seen = 0;
  return patched(good, LOCAL, (view, at) => {
    if (++seen === 3) view.setUint8(at + 30 + START.length, 7);
  });
}

function refused(bytes: Uint8Array, code: string, words: RegExp): void {
  const found = refusal(() => inspect(bytes));
  expect(found).toMatchObject({ code });
  expect(found.message).toMatch(words);
  expect(found.message).not.toContain('\n');
  expect(found.message).toMatch(/; (move|export|save|upload|unpack|repair)|: (export|save|upload)/);
}

describe('models that cannot be used', () => {
  it.each<[string, Uint8Array, string, RegExp]>([
    ['an index beyond the vertices', swapped('v1="0"', 'v1="8"'), 'not_a_mesh', /object 1 of 3D\/3dmodel.model has 8 vertices, and its triangle 1 points at vertex 8/], // prettier-ignore
    ['an index of five thousand million', swapped('v1="0"', 'v1="5000000000"'), 'not_a_mesh', /triangle 1 .* 5000000000/], // prettier-ignore
    ['a negative index', swapped('v2="1"', 'v2="-1"'), 'not_a_mesh', /triangle 1 .* -1/],
    ['an index of one and a half', swapped('v2="1"', 'v2="1.5"'), 'not_a_mesh', /v2 = "1.5"/],
    ['a triangle of two corners', swapped(' v3="2"', ''), 'not_a_mesh', /triangle 1 .* no v3/],
    ['a vertex without z', swapped(' z="20"', ''), 'not_a_mesh', /vertex 4 .* no z/],
    ['a coordinate in words', swapped('x="30"', 'x="far"'), 'not_a_mesh', /vertex 2 .* x = "far"/],
    ['a coordinate with a comma', swapped('x="30"', 'x="30,5"'), 'not_a_mesh', /x = "30,5"/],
    ['not a number', swapped('x="30"', 'x="NaN"'), 'non_finite', /vertex 2 .* x = NaN/],
    ['infinite', swapped('y="20"', 'y="-INF"'), 'non_finite', /y = -INF/],
    ['infinite by its exponent', swapped('y="20"', 'y="1e999"'), 'non_finite', /y = 1e999/],
    ['beyond 1 km', swapped('x="30"', 'x="2e6"'), 'out_of_range', /1 km/],
    ['beyond float32', swapped('x="30"', 'x="1e300"'), 'non_finite', /not numbers/],
    ['an unknown unit', packed(modelXml([one], undefined, 'unit="furlong"')), 'not_a_mesh', /"furlong"/],
    ['a unit by the name of an object’s method', packed(modelXml([one], undefined, 'unit="constructor"')), 'not_a_mesh', /"constructor"/], // prettier-ignore
    ['an object type that 3MF does not know', packed(modelXml([objectXml(1, mesh, 'type="ghost"')])), 'not_a_mesh', /"ghost"/], // prettier-ignore
    ['two objects of one id', packed(modelXml([one, one])), 'not_a_mesh', /two objects with the id 1/],
    ['an object without an id', packed(modelXml([`<object>${mesh}</object>`])), 'not_a_mesh', /no id/],
    ['a mesh and components', packed(modelXml([one, objectXml(2, mesh + componentsXml('objectid="1"'))])), 'not_a_mesh', /a mesh and components/], // prettier-ignore
    ['two meshes in an object', packed(modelXml([objectXml(1, mesh + mesh)])), 'not_a_mesh', /two meshes/],
    ['an item that builds nothing that is there', packed(modelXml([one], ['objectid="9"'])), 'not_a_mesh', /build item 1 .* object 9/], // prettier-ignore
    ['an item without an object', packed(modelXml([one], ['partnumber="1"'])), 'not_a_mesh', /no objectid/],
    ['a transform of eleven numbers', packed(modelXml([one], ['objectid="1" transform="1 0 0 0 1 0 0 0 1 0 0"'])), 'not_a_mesh', /11 numbers/], // prettier-ignore
    ['a transform in words', packed(modelXml([one], ['objectid="1" transform="1 0 0 0 1 0 0 0 1 0 0 up"'])), 'not_a_mesh', /"up" in its transform/], // prettier-ignore
    ['a transform that is not finite', packed(modelXml([one], ['objectid="1" transform="1 0 0 0 1 0 0 0 1 0 0 inf"'])), 'non_finite', /build item 1/], // prettier-ignore
    ['a transform that flattens', packed(modelXml([one], ['objectid="1" transform="1 0 0 0 1 0 0 0 0 0 0 0"'])), 'not_a_mesh', /determinant 0/], // prettier-ignore
    ['a component of itself', packed(modelXml([objectXml(1, componentsXml('objectid="1"'))])), 'not_a_mesh', /component of itself/], // prettier-ignore
    ['a ring of components', packed(modelXml([objectXml(1, componentsXml('objectid="2"')), objectXml(2, componentsXml('objectid="1"'))])), 'not_a_mesh', /component of itself/], // prettier-ignore
    ['components 40 deep', packed(modelXml([one, ...Array.from({ length: 40 }, (_, k) => objectXml(k + 2, componentsXml(`objectid="${k + 1}"`)))], ['objectid="41"'])), 'unsupported', /32 components deep/], // prettier-ignore
    ['a part that is not there', packed(modelXml([], ['objectid="1" p:path="/3D/none.model"'])), 'not_a_mesh', /3d\/none.model/], // prettier-ignore
    ['a path of 1,025 characters', packed(modelXml([], [`objectid="1" p:path="/${'a'.repeat(1024)}"`])), 'not_a_mesh', /build item 1 .* path of 1025 characters, more than the 1024/], // prettier-ignore
    ['a path of 1,024 characters to nothing', packed(modelXml([], [`objectid="1" p:path="/${'a'.repeat(1023)}"`])), 'not_a_mesh', /which the archive does not hold/], // prettier-ignore
    ['an empty build', packed(modelXml([one], [])), 'no_triangles', /nothing into its build/],
    ['a build of supports alone', packed(modelXml([objectXml(1, mesh, 'type="support"')])), 'no_triangles', /object 1 of .* of type support/], // prettier-ignore
    ['an object of nothing', packed(modelXml([objectXml(1, '')])), 'no_triangles', /no triangles/],
    ['a mesh of nothing', packed(modelXml([objectXml(1, '<mesh><vertices/><triangles/></mesh>')])), 'no_triangles', /no triangles/], // prettier-ignore
    ['a required extension that is not read', packed(modelXml([one], undefined, 'xmlns:b="http://schemas.microsoft.com/3dmanufacturing/beamlattice/2017/02" requiredextensions="p b"')), 'unsupported', /beamlattice/], // prettier-ignore
    ['a required extension that is not declared', packed(modelXml([one], undefined, 'requiredextensions="q"')), 'not_a_mesh', /extension "q"/], // prettier-ignore
    ['a shape that an extension gives', packed(modelXml([objectXml(1, '<v:levelset xmlns:v="urn:volume"/>')])), 'unsupported', /urn:volume/], // prettier-ignore
    ['a shape that an extension adds inside a mesh, required or not', packed(modelXml([objectXml(1, mesh.replace('</mesh>', '<b:beamlattice xmlns:b="urn:beams"><b:beams/></b:beamlattice></mesh>'))])), 'unsupported', /object 1 of .* <beamlattice> of "urn:beams" inside its mesh/], // prettier-ignore
    ['a build of what is marked not to be printed alone', packed(modelXml([one], ['objectid="1" printable="0"'])), 'no_triangles', /build item 1 of .* marked not to be printed/], // prettier-ignore
    ['an item after one that is not printed, by its own number', packed(modelXml([one], ['objectid="1" printable="0"', 'objectid="x"'])), 'not_a_mesh', /build item 2 /], // prettier-ignore
    ['another document', packed('<svg xmlns="http://www.w3.org/2000/svg"/>'), 'not_a_mesh', /no 3MF model: its root is <svg>/], // prettier-ignore
    ['a model of another namespace', swapped('core/2015/02', 'core/1999/01'), 'not_a_mesh', /no 3MF model/],
    ['an entity bomb', packed('<!DOCTYPE model [<!ENTITY a "aaaaaaaaaa"><!ENTITY b "&a;&a;&a;">]><model>&b;</model>'), 'unsupported', /document type or entities/], // prettier-ignore
    ['an external entity', swapped('<model', '<!DOCTYPE model SYSTEM "file:///etc/passwd"><model'), 'unsupported', /document type/], // prettier-ignore
    [
      'XML that ends early',
      withModel((text) => text.slice(0, 900)),
      'truncated',
      /3D\/3dmodel.model ends inside/,
    ],
    ['an empty part', packed(''), 'truncated', /before the first element/],
    [
      'crossed tags',
      swapped('</vertices>', '</triangles>'),
      'not_a_mesh',
      /closes <triangles> where <vertices>/,
    ],
    [
      'a tag without an end',
      packed(`<model a="${'x'.repeat(2 * MAX_TAG_BYTES)}`),
      'not_a_mesh',
      /tag of more than/,
    ],
  ])('%s', (_, bytes, code, words) => refused(bytes, code, words));

  it('doubling components thirty times over ends at the cap at once, not after 2^30 copies', () => {
    const doubling = Array.from({ length: 30 }, (_, k) => objectXml(k + 2, componentsXml(`objectid="${k + 1}"`, `objectid="${k + 1}"`))); // prettier-ignore
    refused(packed(modelXml([one, ...doubling], ['objectid="31"'])), 'too_large_file', /100000 components/);
    const hollow = objectXml(1, '');
    refused(
      packed(modelXml([hollow, ...doubling], ['objectid="31"'])),
      'too_large_file',
      /100000 components/,
    );
  });
});

describe('archives that cannot be used', () => {
  const rels = strToU8(relationsXml());
  const model = strToU8(modelXml([one]));
  const entries = (names: Record<string, Uint8Array>) => zipSync(names);

  it.each<[string, Uint8Array, string, RegExp]>([
    ['cut in the middle', cut(0.5), 'truncated', /without the archive's directory/],
    ['cut before its last byte', good.slice(0, -1), 'truncated', /directory/],
    ['only a head', good.slice(0, 40), 'truncated', /directory/],
    ['without files', zipSync({}), 'empty', /no files/],
    ['without relationships: a ZIP of other things', entries({ 'part.stl': model }), 'not_a_mesh', /no 3MF: it has no _rels\/.rels/], // prettier-ignore
    ['without a start part', entries({ '_rels/.rels': strToU8(relationsXml().replace('3dmodel"', 'thumbnail"')), [START]: model }), 'not_a_mesh', /no 3D model/], // prettier-ignore
    ['with two start parts', entries({ '_rels/.rels': strToU8(relationsXml().replace(/<Relationship T.*\/>/, '$&$&')), [START]: model }), 'not_a_mesh', /2 3D models/], // prettier-ignore
    ['whose start part is missing', entries({ '_rels/.rels': rels }), 'not_a_mesh', /holds no such part/],
    ['whose start part lies outside', packed(modelXml([one]), { '_rels/.rels': strToU8(relationsXml('http://127.0.0.1:9/x.model').replace('Id=', 'TargetMode="External" Id=')) }), 'not_a_mesh', /no 3D model/], // prettier-ignore
    ['with a file twice', patched(entries({ '_rels/.rels': rels, [START]: model, '3D/3dmodel.modeL': model }), 0, () => undefined), 'not_a_mesh', /twice/], // prettier-ignore
    ['encrypted', inModel((view, at) => view.setUint16(at + 8, 1, true)), 'unsupported', /encrypted/],
    ['packed by a method that 3MF does not know', inModel((view, at) => view.setUint16(at + 10, 14, true)), 'unsupported', /method 14/], // prettier-ignore
    ['with a size that is too small', inModel((view, at) => view.setUint32(at + 24, 100, true)), 'count_mismatch', /100 bytes, it has more/], // prettier-ignore
    ['with a size that is too large', inModel((view, at) => view.setUint32(at + 24, 4_000_000_000, true)), 'count_mismatch', /4000000000 bytes, it has \d+/], // prettier-ignore
    ['with packed bytes beyond the file', inModel((view, at) => view.setUint32(at + 20, 4_000_000_000, true)), 'not_a_mesh', /past the file's end/], // prettier-ignore
    [
      'with a false checksum',
      inModel((view, at) => view.setUint32(at + 16, 7, true)),
      'not_a_mesh',
      /checksum/,
    ],
    ['with an entry elsewhere', inModel((view, at) => view.setUint32(at + 42, 12, true)), 'not_a_mesh', /not where the directory says/], // prettier-ignore
    ['with two entries on the same bytes', inModel((view, at) => view.setUint32(at + 42, 0, true)), 'not_a_mesh', /another name where its bytes lie/], // prettier-ignore
    ['with more files than it says', patched(good, END, (view, at) => view.setUint16(at + 10, 2, true)), 'count_mismatch', /says 2 files and holds more/], // prettier-ignore
    ['with fewer files than it says', patched(good, END, (view, at) => view.setUint16(at + 10, 9, true)), 'count_mismatch', /says 9 files and holds 3/], // prettier-ignore
    ['of several volumes', patched(good, END, (view, at) => view.setUint16(at + 4, 1, true)), 'unsupported', /several volumes/], // prettier-ignore
    ['marked as ZIP64 without being it', patched(good, END, (view, at) => view.setUint32(at + 16, 0xffffffff, true)), 'not_a_mesh', /ZIP64/], // prettier-ignore
    ['with a directory outside the file', patched(good, END, (view, at) => view.setUint32(at + 16, 3_000_000, true)), 'not_a_mesh', /outside the file/], // prettier-ignore
    ['with 1,001 files', entries(Object.fromEntries(Array.from({ length: 1001 }, (_, k) => [`f${k}`, rels]))), 'too_large_file', /1001 files/], // prettier-ignore
    ['with damaged packed bytes', damaged(), 'not_a_mesh', /cannot be unpacked/],
  ])('%s', (_, bytes, code, words) => refused(bytes, code, words));

  it('entries over one another are refused, however they are named', () => {
    const stored = packed(modelXml([one]), { 'a.txt': rels, 'b.txt': rels }, 0);
    let from = 0;
    const overlapped = patched(stored, CENTRAL, (view, at) => {
      const name = new TextDecoder().decode(
        stored.subarray(at + 46, at + 46 + view.getUint16(at + 28, true)),
      );
      if (name === 'a.txt') from = view.getUint32(at + 42, true);
      if (name === 'a.txt') view.setUint32(at + 20, view.getUint32(at + 20, true) + 40, true);
    });
    expect(from).toBeGreaterThan(0);
    refused(overlapped, 'not_a_mesh', /share the same bytes/);
  });

  it.each([
    '../../etc/x',
    '/abs/x',
    'C:\\x',
    '..\\x',
    'a/%2e%2e/%2e%2e/x',
    'a/%2F..%2Fx',
    'x\u0000y',
    'a//b',
    '.',
    '\u202egpj.exe',
  ])('an entry named %j harms nothing: it is no part, and the model is read', (name) => {
    expect(inspect(packed(modelXml([one]), { [name]: strToU8('<html/>') })).triangles).toBe(12);
  });

  it.each([
    '../3D/3dmodel.model',
    '/3D/../../3D/3dmodel.model',
    '/3D\\3dmodel.model',
    '/3D/%2e%2e/3D/3dmodel.model',
    '//3D/3dmodel.model',
  ])(
    'a start part named %j is not found',
    (target) => refused(packed(modelXml([one]), { '_rels/.rels': strToU8(relationsXml(target)) }), 'not_a_mesh', /holds no such part/), // prettier-ignore
  );

  it('a bomb of blanks in a relationships part ends at its cap', () => {
    const blanks = strToU8(relationsXml().replace('</', `${' '.repeat(3_000_000)}</`));
    refused(packed(modelXml([one]), { '_rels/.rels': blanks }), 'too_large_file', /1 MB/);
  });

  it(
    'a megabyte that unpacks to a gigabyte ends at the cap, without keeping it',
    { timeout: 180_000 },
    () => {
      const bomb = blankBomb(1000);
      expect(bomb.length).toBeLessThan(1_500_000);
      const before = process.memoryUsage().rss;
      refused(bomb, 'too_large_file', /more than the 800 MB/);
      expect(process.memoryUsage().rss - before).toBeLessThan(256e6);
    },
  );
});
