import { strToU8, gzipSync, zipSync } from 'fflate';
import { describe, expect, it } from 'vitest';
import { analyseFile } from '@/lib/formability/analyse-file';
import type { RecipeInput } from '@/lib/formability/recipe';
import type { Report } from '@/lib/formability/report';
import { UnusableInput } from '@/lib/formability/unusable-input';
import { frustumAnswer } from '../../../fixtures/meshes/answers';
import { frustum } from '../../../fixtures/meshes/solids';
import { flipped, scaled, type Triangles } from '../../../fixtures/meshes/triangles';
import { componentsXml, meshXml, modelXml, objectXml, packed, plain3mf, relationsXml } from '../../../fixtures/meshes/write-3mf'; // prettier-ignore
import { cylindersStep, frustumStep } from '../../../fixtures/meshes/write-step';
import { asciiStl, binaryStl } from '../../../fixtures/meshes/write-stl';
import { abs, has, missesOf, rel, type Claims } from './claims';

const part = frustum(60, 40, 20, 5);
const answer = frustumAnswer(60, 40, 20, [5, 5, 5, 5]);
const binary = binaryStl(part);
const ascii = new TextDecoder().decode(asciiStl(part));
const bytesOf = (text: string) => new TextEncoder().encode(text);
const joined = (...parts: Uint8Array[]) => new Uint8Array(parts.flatMap((one) => Array.from(one)));
const zeros = (n: number) => new Uint8Array(n);
const COARSE: RecipeInput = { grid: { cellMm: 0.5 } };

function withCount(count: number, littleEndian = true): Uint8Array {
  const copy = binary.slice();
  new DataView(copy.buffer).setUint32(80, count, littleEndian);
  return copy;
}

function withFloat(value: number, at = 84 + 50 * 3 + 12 + 16): Uint8Array {
  const copy = binary.slice();
  new DataView(copy.buffer).setFloat32(at, value, true);
  return copy;
}

/** Every number in the other byte order. */
function bigEndian(): Uint8Array {
  const copy = withCount(12, false);
  const view = new DataView(copy.buffer);
  for (let t = 0; t < 12; t++) {
    for (let k = 0; k < 12; k++) {
      const at = 84 + 50 * t + 4 * k;
      view.setFloat32(at, view.getFloat32(at, true), false);
    }
  }
  return copy;
}

function utf16(text: string, littleEndian: boolean): Uint8Array {
  const bytes = new Uint8Array(2 + 2 * text.length);
  const view = new DataView(bytes.buffer);
  view.setUint16(0, 0xfeff, littleEndian);
  for (let i = 0; i < text.length; i++) view.setUint16(2 + 2 * i, text.charCodeAt(i), littleEndian);
  return bytes;
}

async function outcome(bytes: Uint8Array): Promise<{ code: string; message: string } | Report> {
  try {
    return (await analyseFile(bytes, COARSE, { geometryOnly: true })).report;
  } catch (error) {
    if (error instanceof UnusableInput) return { code: error.code, message: error.message };
    throw error;
  }
}

const sameFacets = (facet: number[]) => Array.from({ length: 12 }, () => facet).flat();
const png = joined(Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10, 0, 0, 0, 13, 73, 72, 68, 82), zeros(600)); // prettier-ignore
const facetText =
  'facet normal 0 0 1\nouter loop\nvertex 0 0 0\nvertex 10 0 0\nvertex 0 10 0\nendloop\nendfacet\n';

/** The file, and the codes that the contract allows for it. */
const BROKEN: [string, Uint8Array, string][] = [
  ['nothing', zeros(0), 'empty'],
  ['white space', bytesOf('  \r\n\t '), 'empty'],
  ['ten bytes', binary.slice(0, 10), 'truncated|not_a_mesh'],
  ['83 bytes', binary.slice(0, 83), 'truncated'],
  ['a header without facets', withCount(12).slice(0, 84), 'truncated|count_mismatch'],
  ['a facet cut in two', binary.slice(0, 84 + 50 * 7 + 20), 'truncated'],
  ['facets missing', binary.slice(0, 84 + 50 * 7), 'truncated|count_mismatch'],
  ['the last byte missing', binary.slice(0, -1), 'truncated'],
  ['a count one too big', withCount(13), 'count_mismatch|truncated'],
  ['a count too small', withCount(5), 'count_mismatch'],
  ['a count of 0 over facets', withCount(0), 'count_mismatch|no_triangles'],
  ['a count of 0 and nothing else', withCount(0).slice(0, 84), 'no_triangles'],
  ['a count of 0xFFFFFFFF', withCount(0xffffffff), 'count_mismatch|truncated'],
  ['a count of 0xFFFFFFFF and nothing else', withCount(0xffffffff).slice(0, 84), 'count_mismatch|truncated'],
  ['big-endian numbers', bigEndian(), 'count_mismatch|not_a_mesh|truncated'],
  ['NaN', withFloat(NaN), 'non_finite'],
  ['infinity', withFloat(Infinity), 'non_finite'],
  ['minus infinity', withFloat(-Infinity), 'non_finite'],
  ['1e30', withFloat(1e30), 'out_of_range'],
  ['−2e6', withFloat(-2e6), 'out_of_range'],
  ['a thousand zeros', zeros(1000), 'no_triangles|not_a_mesh|count_mismatch'],
  ['noise', Uint8Array.from({ length: 5000 }, (_, i) => (i * i * 37 + 11 * i + (i >> 3)) & 255), 'not_a_mesh|count_mismatch|truncated'], // prettier-ignore
  ['ASCII cut inside a facet', bytesOf(ascii.slice(0, 700)), 'truncated'],
  ['ASCII cut inside a number', bytesOf(ascii.slice(0, ascii.indexOf('vertex') + 9)), 'truncated|no_triangles'],
  ['ASCII of a name only', bytesOf('solid part\nendsolid part\n'), 'no_triangles'],
  ['the word solid', bytesOf('solid'), 'no_triangles|truncated|not_a_mesh'],
  ['ASCII with nan', bytesOf(ascii.replace('vertex 30', 'vertex nan')), 'non_finite'],
  ['ASCII with NaN(ind)', bytesOf(ascii.replace('vertex 30', 'vertex -1.#IND')), 'non_finite|not_a_mesh'],
  ['ASCII with inf', bytesOf(ascii.replace('vertex 30', 'vertex Infinity')), 'non_finite'],
  ['ASCII with 1e39, beyond float32', bytesOf(ascii.replace('vertex 30', 'vertex 1e39')), 'out_of_range|non_finite'], // prettier-ignore
  ['ASCII with 1e999', bytesOf(ascii.replace('vertex 30', 'vertex 1e999')), 'out_of_range|non_finite'],
  ['ASCII with decimal commas', bytesOf(ascii.replaceAll('vertex 30', 'vertex 30,5')), 'not_a_mesh'],
  ['ASCII with two coordinates', bytesOf(ascii.replace('vertex 30 -20 0', 'vertex 30 -20')), 'not_a_mesh'],
  ['ASCII with four coordinates', bytesOf(ascii.replace('vertex 30 -20 0', 'vertex 30 -20 0 1')), 'not_a_mesh'],
  ['ASCII with four corners', bytesOf(ascii.replace('endloop', 'vertex 1 2 3\nendloop')), 'not_a_mesh'],
  ['ASCII with two corners', bytesOf(ascii.replace('      vertex 30 -20 0\n', '')), 'not_a_mesh|truncated'],
  ['ASCII in hexadecimal', bytesOf(ascii.replaceAll('vertex 30', 'vertex 0x1e')), 'not_a_mesh'],
  ['ASCII without endfacet', bytesOf(ascii.replaceAll('  endfacet\n', '')), 'not_a_mesh'],
  ['ASCII in UTF-16, little end', utf16(ascii, true), 'not_a_mesh|unsupported'],
  ['ASCII in UTF-16, big end', utf16(ascii, false), 'not_a_mesh|unsupported'],
  ['a letter', bytesOf('Dear sir, find the template enclosed. '.repeat(50)), 'not_a_mesh'],
  ['a web page', bytesOf(`<!DOCTYPE html><html><body>${'<p>404</p>'.repeat(30)}</body></html>`), 'not_a_mesh|unsupported'], // prettier-ignore
  ['JSON', bytesOf(JSON.stringify({ vertices: part })), 'not_a_mesh|unsupported'],
  ['a table', bytesOf('x;y;z\n1;2;3\n'.repeat(40)), 'not_a_mesh'],
  ['a picture', png, 'not_a_mesh|unsupported'],
  ['a PDF', bytesOf(`%PDF-1.7\n${'1 0 obj\n'.repeat(60)}`), 'not_a_mesh|unsupported'],
  ['an OBJ', bytesOf('o part\nv 0 0 0\nv 1 0 0\nv 0 1 0\nf 1 2 3\n'.repeat(5)), 'unsupported|not_a_mesh'],
  ['a PLY', bytesOf('ply\nformat ascii 1.0\nelement vertex 0\nend_header\n'.padEnd(200)), 'unsupported|not_a_mesh'],
  ['a glTF', joined(bytesOf('glTF'), zeros(200)), 'unsupported|not_a_mesh'],
  ['a gzipped STL', gzipSync(binary), 'unsupported|not_a_mesh'],
  ['a ZIP with an STL in it', zipSync({ 'part.stl': binary }), 'unsupported|not_a_mesh'],
  ['a ZIP cut in two', plain3mf(part).slice(0, 500), 'truncated|not_a_mesh|unsupported'],
  ['a ZIP signature only', joined(Uint8Array.of(0x50, 0x4b, 3, 4), zeros(300)), 'truncated|not_a_mesh|unsupported'],
  ['a 3MF without a model', zipSync({ '_rels/.rels': strToU8(relationsXml()) }), 'not_a_mesh|unsupported'],
  ['a 3MF without triangles', packed(modelXml([objectXml(1, '<mesh><vertices/><triangles/></mesh>')])), 'no_triangles|not_a_mesh'], // prettier-ignore
  ['a 3MF that builds nothing', packed(modelXml([objectXml(1, meshXml(part))], [])), 'no_triangles'],
  ['a 3MF with an index beyond its corners', packed(modelXml([objectXml(1, meshXml(part).replace('v1="0"', 'v1="99"'))])), 'not_a_mesh'], // prettier-ignore
  ['a 3MF with a negative index', packed(modelXml([objectXml(1, meshXml(part).replace('v1="0"', 'v1="-1"'))])), 'not_a_mesh'], // prettier-ignore
  ['a 3MF with NaN', packed(modelXml([objectXml(1, meshXml(part).replace('x="30"', 'x="NaN"'))])), 'non_finite|not_a_mesh'], // prettier-ignore
  ['a 3MF with 1e30', packed(modelXml([objectXml(1, meshXml(part).replace('x="30"', 'x="1e30"'))])), 'out_of_range'], // prettier-ignore
  ['a 3MF with a document type', packed(modelXml([objectXml(1, meshXml(part))]).replace('<model', '<!DOCTYPE model [<!ENTITY a "b">]><model')), 'unsupported|not_a_mesh'], // prettier-ignore
  ['a 3MF whose component holds itself', packed(modelXml([objectXml(1, componentsXml('objectid="1"'))])), 'not_a_mesh'], // prettier-ignore
  ['a 3MF with an unclosed tag', packed(modelXml([objectXml(1, meshXml(part))]).replace('</model>', '')), 'not_a_mesh|truncated'], // prettier-ignore
  ['a 3MF in an unknown unit', plain3mf(part, 'unit="furlong"'), 'not_a_mesh|unsupported'],
  ['a STEP header only', bytesOf('ISO-10303-21;\nHEADER;\nENDSEC;\n'), 'truncated|not_a_mesh|no_triangles'],
  ['a STEP cut in two', frustumStep(60, 40, 20, 5).slice(0, 2500), 'truncated|not_a_mesh|no_triangles'],
  ['a STEP without a body', cylindersStep([]), 'no_triangles|not_a_mesh'],
  ['facets without area only', binaryStl(sameFacets([1, 1, 1, 1, 1, 1, 1, 1, 1])), 'no_triangles'],
]; // prettier-ignore

describe('files that cannot be used', () => {
  it.each(BROKEN)('%s', async (_, bytes, allowed) => {
    const found = await outcome(bytes);
    expect('code' in found ? found.code : 'a report', 'message' in found ? found.message : '').toMatch(new RegExp(`^(${allowed})$`)); // prettier-ignore
    if ('code' in found) {
      expect(found.message).not.toMatch(/\n|undefined|NaN:|\[object/);
      expect(found.message.length).toBeGreaterThan(30);
    }
  });
});

const sound: Claims = {
  'input.triangles': 12,
  'mesh.volumeMm3': rel(answer.volumeMm3, 1e-5),
  'mesh.watertight': true,
  'mesh.boundsMm.min': [-30, -20, 0],
  'mesh.boundsMm.max': [30, 20, 20],
  'draft.minUpFacingDeg': abs(5, 0.02),
  'mesh.warnings': [],
};
const warned = (...codes: string[]) => ({ ...sound, 'mesh.warnings': has(...codes) });

function nanNormals(): Uint8Array {
  const copy = binary.slice();
  const view = new DataView(copy.buffer);
  for (let t = 0; t < 12; t++) for (let k = 0; k < 3; k++) view.setFloat32(84 + 50 * t + 4 * k, NaN, true);
  return copy;
}

function colours(): Uint8Array {
  const copy = binary.slice();
  for (let t = 0; t < 12; t++) copy.fill(0xa5, 84 + 50 * t + 48, 84 + 50 * t + 50);
  return copy;
}

function wrongNormals(): Uint8Array {
  const copy = binary.slice();
  const view = new DataView(copy.buffer);
  for (let t = 0; t < 12; t++) view.setFloat32(84 + 50 * t + 8, t < 2 ? 1 : -1, true);
  return copy;
}

const inObject = (mesh: Triangles, attributes = '') => objectXml(1, meshXml(mesh), attributes);

const USABLE: [string, Uint8Array, Claims][] = [
  ['binary', binary, { ...sound, 'input.format': 'stl-binary', 'input.bytes': 684 }],
  ['binary that begins with "solid"', binaryStl(part, 'solid facet normal outer loop vertex'), { ...sound, 'input.format': 'stl-binary' }], // prettier-ignore
  ['binary with bytes behind', joined(binary, bytesOf('made by nobody')), warned('trailing_data')],
  ['binary with normals that are no numbers', nanNormals(), sound],
  ['binary with colours', colours(), sound],
  ['binary with normals that face inward', wrongNormals(), warned('normals_disagree')],
  ['binary inside out', binaryStl(flipped(part)), { ...warned('inverted'), 'mesh.volumeMm3': rel(-answer.volumeMm3, 1e-5), 'mesh.unionVolumeMm3': rel(answer.volumeMm3, 1e-5) }], // prettier-ignore
  ['ASCII', bytesOf(ascii), { ...sound, 'input.format': 'stl-ascii' }],
  ['ASCII with Windows line ends', bytesOf(ascii.replaceAll('\n', '\r\n')), sound],
  ['ASCII with old line ends', bytesOf(ascii.replaceAll('\n', '\r')), sound],
  ['ASCII in capitals', bytesOf(ascii.toUpperCase()), sound],
  ['ASCII with tabs', bytesOf(ascii.replaceAll('  ', '\t').replaceAll(' ', '\t')), sound],
  ['ASCII behind blank lines', bytesOf(`\n\n  ${ascii}`), sound],
  ['ASCII behind a byte order mark', joined(Uint8Array.of(0xef, 0xbb, 0xbf), bytesOf(ascii)), sound],
  ['ASCII without endsolid', bytesOf(ascii.replace(/endsolid.*\n/, '')), sound],
  ['ASCII without a name', bytesOf(ascii.replaceAll(' test', '')), sound],
  ['ASCII with a name of key words', bytesOf(ascii.replaceAll('test', 'facet vertex endsolid loop')), sound],
  ['ASCII with a name in Greek', bytesOf(ascii.replaceAll('test', 'πρότυπο')), sound],
  ['ASCII with exponents', asciiStl(part, (value) => Math.fround(value).toExponential(9)), sound],
  ['ASCII with plus signs', asciiStl(part, (value) => (value > 0 ? `+${Math.fround(value)}` : String(Math.fround(value)))), sound], // prettier-ignore
  ['ASCII with bare points', asciiStl(part, (value) => String(Math.fround(value)).replace(/^(-?\d+)$/, '$1.')), sound], // prettier-ignore
  ['ASCII with normals that are no numbers', bytesOf(ascii.replaceAll('normal 0 0 0', 'normal nan nan nan')), sound], // prettier-ignore
  ['ASCII with text behind', bytesOf(`${ascii}made on a Monday\n`), warned('trailing_data')],
  ['ASCII of two solids', bytesOf(ascii + new TextDecoder().decode(asciiStl(frustum(60, 40, 20, 5).map((v, i) => (i % 3 === 0 ? v + 100 : v))))), { 'input.triangles': 24, 'mesh.shells': 2, 'mesh.volumeMm3': rel(2 * answer.volumeMm3, 1e-5) }], // prettier-ignore
  ['ASCII of one facet', bytesOf(`solid s\n${facetText}endsolid s\n`), { 'input.triangles': 1, 'mesh.watertight': false, 'mesh.warnings': has('not_watertight') }], // prettier-ignore
  ['3MF', plain3mf(part), { ...sound, 'input.format': '3mf', 'input.unit': 'mm' }],
  ['3MF, stored', packed(modelXml([inObject(part)]), {}, 0), sound],
  ['3MF in inches', plain3mf(scaled(part, 1 / 25.4), 'unit="inch"'), { ...sound, 'mesh.boundsMm.min': [abs(-30, 1e-5), abs(-20, 1e-5), 0], 'mesh.boundsMm.max': [abs(30, 1e-5), abs(20, 1e-5), abs(20, 1e-5)], 'input.unit': 'in' }], // prettier-ignore
  ['3MF in metres', plain3mf(scaled(part, 1e-3), 'unit="meter"'), { ...sound, 'mesh.boundsMm.min': [abs(-30, 1e-5), abs(-20, 1e-5), 0], 'mesh.boundsMm.max': [abs(30, 1e-5), abs(20, 1e-5), abs(20, 1e-5)], 'input.unit': 'm' }], // prettier-ignore
  ['3MF without a unit: millimetres', plain3mf(part, ''), sound],
  ['3MF with a moved and a turned item', packed(modelXml([inObject(part)], ['objectid="1"', 'objectid="1" transform="0 1 0 -1 0 0 0 0 1 100 0 0"'])), { 'input.triangles': 24, 'mesh.shells': 2, 'mesh.volumeMm3': rel(2 * answer.volumeMm3, 1e-5), 'mesh.boundsMm.max.0': abs(120, 1e-5), 'mesh.boundsMm.max.1': abs(30, 1e-5) }], // prettier-ignore
  ['3MF of components in components, twice as large', packed(modelXml([inObject(part), objectXml(2, componentsXml('objectid="1" transform="2 0 0 0 2 0 0 0 2 0 0 0"')), objectXml(3, componentsXml('objectid="2"', 'objectid="1" transform="1 0 0 0 1 0 0 0 1 200 0 0"'))], ['objectid="3"'])), { 'input.triangles': 24, 'mesh.volumeMm3': rel(9 * answer.volumeMm3, 1e-5), 'mesh.boundsMm.max.2': abs(40, 1e-5) }], // prettier-ignore
  ['3MF with a mirrored item keeps its outside', packed(modelXml([inObject(part)], ['objectid="1" transform="-1 0 0 0 1 0 0 0 1 0 0 0"'])), { ...sound, 'mesh.warnings': (value: unknown) => ((value as string[]).every((code) => code === 'inverted') ? null : 'nothing, or inverted'), 'mesh.volumeMm3': (value: unknown) => (Math.abs(Math.abs(value as number) / answer.volumeMm3 - 1) < 1e-5 ? null : 'the volume'), 'mesh.unionVolumeMm3': rel(answer.volumeMm3, 1e-5) }], // prettier-ignore
  ['3MF with support beside the part', packed(modelXml([inObject(part), objectXml(2, meshXml(scaled(part, 3)), 'type="support"')], ['objectid="1"'])), sound], // prettier-ignore
  ['3MF with entries that point out of it', packed(modelXml([inObject(part)]), { '../../../etc/passwd': strToU8('x'), '/abs': strToU8('y') }), sound], // prettier-ignore
  ['STEP AP203', frustumStep(60, 40, 20, 5, { schema: 'ap203' }), { ...sound, 'input.format': 'step', 'input.triangles': 12 }], // prettier-ignore
  ['STEP AP242 in inches', frustumStep(60 / 25.4, 40 / 25.4, 20 / 25.4, 5, { schema: 'ap242', unit: 'inch' }), { ...sound, 'mesh.boundsMm.min': [abs(-30, 1e-3), abs(-20, 1e-3), 0], 'mesh.boundsMm.max': [abs(30, 1e-3), abs(20, 1e-3), abs(20, 1e-3)] }], // prettier-ignore
  ['STEP of two cylinders', cylindersStep([[0, 0, 20, 30], [60, 0, 10, 15]]), { 'mesh.shells': 2, 'mesh.watertight': true, 'mesh.volumeMm3': rel(Math.PI * (400 * 30 + 100 * 15), 0.005), 'mesh.bedContactAreaMm2': rel(Math.PI * 500, 0.005) }], // prettier-ignore
];

describe('files that can be used, whatever is odd about them', () => {
  it.each(USABLE)('%s', async (_, bytes, claims) => {
    const { report } = await analyseFile(bytes, COARSE, { geometryOnly: true });
    expect(missesOf(report, claims)).toEqual([]);
  });

  it('says the same bits twice', async () => {
    const once = JSON.stringify((await analyseFile(binary, COARSE, { geometryOnly: true })).report);
    expect(JSON.stringify((await analyseFile(binary.slice(), COARSE, { geometryOnly: true })).report)).toBe(
      once,
    );
  });
});
