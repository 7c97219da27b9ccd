import { describe, expect, it } from 'vitest';
import { inspect } from '@/lib/formability/inspect';
import { frustum } from '../../../fixtures/meshes/solids';
import { asciiStl, binaryStl } from '../../../fixtures/meshes/write-stl';
import { refusal } from '../run-engine';

const mesh = frustum(60, 40, 20, 5);
const binary = binaryStl(mesh);
const text = (value: string) => new TextEncoder().encode(value);
const cut = (bytes: Uint8Array, length: number) => bytes.slice(0, length);
const joined = (...parts: Uint8Array[]) => new Uint8Array(parts.flatMap((part) => Array.from(part)));

function withCount(bytes: Uint8Array, count: number): Uint8Array {
  const copy = bytes.slice();
  new DataView(copy.buffer).setUint32(80, count, true);
  return copy;
}

function withCoordinate(value: number, facet = 3, at = 4): Uint8Array {
  const copy = binary.slice();
  new DataView(copy.buffer).setFloat32(84 + 50 * facet + 12 + 4 * at, value, true);
  return copy;
}

describe('binary STL (80 bytes, uint32 count, 50 bytes a facet, little-endian)', () => {
  it('has 84 + 50 n bytes: row G1, 684 for a box of 12 facets', () => {
    expect(binary.length).toBe(684);
  });

  it('is read with its bounds', () => {
    const found = inspect(binary);
    expect(found).toMatchObject({ format: 'stl-binary', triangles: 12, warnings: [] });
    expect(found.boundsMm).toEqual({ min: [-30, -20, 0], max: [30, 20, 20] });
  });

  it('is told by size, not by the word: a header that says "solid" is still binary', () => {
    expect(inspect(binaryStl(mesh, 'solid made by an exporter')).format).toBe('stl-binary');
    expect(inspect(binaryStl(mesh, 'solid facet normal vertex')).format).toBe('stl-binary');
  });

  it('with a few bytes after the last facet is read, with a warning', () => {
    const found = inspect(joined(binary, new Uint8Array(10).fill(7)));
    expect(found.triangles).toBe(12);
    expect(found.warnings).toEqual(['trailing_data']);
    expect(inspect(joined(binary, new Uint8Array(100))).warnings).toEqual(['trailing_data']);
  });

  it('with stored normals that face the other way is read, with a warning', () => {
    const copy = binary.slice();
    const view = new DataView(copy.buffer);
    for (let t = 0; t < 12; t++) view.setFloat32(84 + 50 * t + 8, t < 2 ? 1 : 0, true);
    expect(inspect(copy).warnings).toEqual(['normals_disagree']);
  });

  it('reads from the middle of a larger buffer, at an odd offset', () => {
    const buffer = new Uint8Array(binary.length + 7);
    buffer.set(binary, 3);
    expect(inspect(buffer.subarray(3, 3 + binary.length)).triangles).toBe(12);
  });
});

describe('ASCII STL', () => {
  it.each([
    ['as written', asciiStl(mesh)],
    ['with Windows line ends', asciiStl(mesh, String, '\r\n')],
    ['with old Macintosh line ends', asciiStl(mesh, String, '\r')],
    ['in one line', asciiStl(mesh, String, ' ')],
    ['with exponents', asciiStl(mesh, (value) => value.toExponential(9))],
    ['in capitals', text(new TextDecoder().decode(asciiStl(mesh)).toUpperCase())],
    ['with a byte order mark', joined(new Uint8Array([0xef, 0xbb, 0xbf]), asciiStl(mesh))],
    ['without a name', text(new TextDecoder().decode(asciiStl(mesh)).replaceAll(' test', ''))],
    ['without endsolid', text(new TextDecoder().decode(asciiStl(mesh)).replace('endsolid test', ''))],
  ])('%s is the same mesh', (_, bytes) => {
    const found = inspect(bytes);
    expect(found).toMatchObject({ format: 'stl-ascii', triangles: 12, warnings: [] });
    expect(found.boundsMm).toEqual({ min: [-30, -20, 0], max: [30, 20, 20] });
  });

  it('may hold several solids', () => {
    expect(inspect(joined(asciiStl(mesh), asciiStl(mesh))).triangles).toBe(24);
  });

  it('with text after endsolid is read, with a warning', () => {
    expect(inspect(joined(asciiStl(mesh), text('made on a Monday\n'))).warnings).toEqual(['trailing_data']);
  });

  it('gives each number the float32 that the language itself would', () => {
    const odd = [0.1, 1 / 3, 1e-7, 123456.789, 167772.17, 0.30000001192092896, 5e-324, -0, 2.5e-8];
    const bytes = asciiStl([...odd], (value) => value.toPrecision(17));
    const { boundsMm } = inspect(bytes);
    expect(boundsMm.max).toEqual(
      [0, 1, 2].map((k) => Math.max(odd[k], odd[k + 3], odd[k + 6])).map(Math.fround),
    );
  });
});

describe('files that cannot be used are refused with what, where and what to do', () => {
  const ascii = asciiStl(mesh);
  const asText = new TextDecoder().decode(ascii);
  const png = joined(new Uint8Array([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10]), new Uint8Array(500));
  it.each([
    ['no bytes', new Uint8Array(0), 'empty'],
    ['only white space', text(' \n\t\n'), 'empty'],
    ['cut in its header', cut(binary, 50), 'truncated'],
    ['cut inside a facet', cut(binary, 84 + 50 * 7 + 20), 'truncated'],
    ['cut in mid-download', cut(binary, 400), 'truncated'],
    ['cut between facets', cut(binary, 84 + 50 * 7), 'count_mismatch'],
    ['a count beyond the facets', withCount(binary, 13), 'count_mismatch'],
    ['a count short of the facets', withCount(binary, 5), 'count_mismatch'],
    ['a count of none over twelve facets', withCount(binary, 0), 'count_mismatch'],
    ['a count of 0xFFFFFFFF in 84 bytes', withCount(cut(binary, 84), 0xffffffff), 'count_mismatch'],
    ['a count of 0', withCount(cut(binary, 84), 0), 'no_triangles'],
    ['not a number', withCoordinate(NaN), 'non_finite'],
    ['infinite', withCoordinate(Infinity), 'non_finite'],
    ['minus infinite', withCoordinate(-Infinity), 'non_finite'],
    ['beyond 1 km', withCoordinate(1e7), 'out_of_range'],
    ['a PNG renamed', png, 'not_a_mesh'],
    ['a PDF renamed', text('%PDF-1.7\n%…'), 'not_a_mesh'],
    ['a web page', text(`<!doctype html><html>${' '.repeat(200)}</html>`), 'not_a_mesh'],
    ['a letter', text('Dear sir, please find the template enclosed.'), 'not_a_mesh'],
    ['a long letter', text('Dear sir, please find the template enclosed. '.repeat(40)), 'not_a_mesh'],
    ['a JSON document', text('{"vertices":[0,0,0]}'.padEnd(200)), 'not_a_mesh'],
    ['noise', Uint8Array.from({ length: 4000 }, (_, i) => (i * i * 31 + 7 * i) & 255), 'not_a_mesh'],
    ['an OBJ model', text('# cube\nv 0 0 0\nv 1 0 0\nv 0 1 0\nf 1 2 3\n'), 'unsupported'],
    ['a STEP model, which must be converted first', text('ISO-10303-21;\nHEADER;\nENDSEC;'), 'unsupported'],
    [
      'the head of a ZIP archive',
      joined(new Uint8Array([0x50, 0x4b, 3, 4]), new Uint8Array(300)),
      'truncated',
    ],
    ['ASCII cut inside a facet', cut(ascii, 700), 'truncated'],
    ['ASCII cut inside a word', text(asText.slice(0, asText.lastIndexOf('endfacet') + 4)), 'truncated'],
    ['ASCII without facets', text('solid nothing\nendsolid nothing\n'), 'no_triangles'],
    ['ASCII with nan', text(asText.replace('vertex 30', 'vertex nan')), 'non_finite'],
    ['ASCII with inf', text(asText.replace('vertex 30', 'vertex -inf')), 'non_finite'],
    ['ASCII with decimal commas', text(asText.replaceAll('vertex 30', 'vertex 30,5')), 'not_a_mesh'],
    ['ASCII with a wrong keyword', text(asText.replace('outer loop', 'inner loop')), 'not_a_mesh'],
    ['ASCII with two coordinates', text(asText.replace('vertex 30 -20 0', 'vertex 30 -20')), 'not_a_mesh'],
  ])('%s', (_, bytes, code) => {
    const found = refusal(() => inspect(bytes));
    expect(found.code).toBe(code);
    expect(found.message).not.toContain('\n');
    expect(found.message.length).toBeGreaterThan(30);
  });

  it('names the facet, the corner and the axis of a bad number', () => {
    expect(refusal(() => inspect(withCoordinate(NaN, 3, 4))).message).toContain('facet 4, corner 2, y = NaN');
  });

  it('names the line of a bad word', () => {
    const bytes = text(asText.replace('outer loop', 'inner loop'));
    expect(refusal(() => inspect(bytes)).message).toContain('line 3 has "inner"');
  });

  it('asks for no memory by a count field: 0xFFFFFFFF would be 150 GB', () => {
    const before = process.memoryUsage().arrayBuffers;
    refusal(() => inspect(withCount(cut(binary, 84 + 50 * 2 + 10), 0xffffffff)));
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(1e6);
  });

  it('counts the range in millimetres: 2000 m are too far, 2000 mm are not', () => {
    const far = withCoordinate(2000);
    expect(inspect(far, 'mm').triangles).toBe(12);
    expect(refusal(() => inspect(far, 'm')).code).toBe('out_of_range');
  });
});
