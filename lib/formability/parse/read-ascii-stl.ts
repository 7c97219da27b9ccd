import type { MeshWarning } from '../report';
import { UnusableInput } from '../unusable-input';
import type { RawMesh } from './raw-mesh';
import { TokenReader } from './token-reader';

/** Fewest bytes that one facet of an ASCII STL can take; bounds the memory by the file's size. */
const LEAST_FACET_BYTES = 60;

/**
 * Reads an ASCII STL: any case, any white space, several solids, names of any length, no closing `endsolid`
 * needed after a complete facet.
 * @throws UnusableInput truncated, no_triangles, not_a_mesh with the line number.
 */
export function readAsciiStl(bytes: Uint8Array): RawMesh {
  const reader = new TokenReader(bytes);
  const state = { coords: new Float32Array(9 * 256), triangles: 0, against: 0, first: -1 };
  const ceiling = Math.ceil(bytes.length / LEAST_FACET_BYTES) * 9;
  const normal = new Float64Array(3);
  const warnings: MeshWarning[] = [];
  let closed = true;
  for (let word = reader.word(); word !== ''; word = reader.word()) {
    if (word === 'solid') {
      reader.skipName();
      closed = false;
    } else if (word === 'endsolid') {
      reader.skipName();
      closed = true;
    } else if (word === 'facet') {
      if (state.coords.length < (state.triangles + 1) * 9) grow(state, ceiling);
      readFacet(reader, state, normal);
    } else if (closed && state.triangles > 0) {
      warnings.push('trailing_data');
      break;
    } else if (state.triangles === 0 && reader.ended()) {
      break;
    } else {
      throw notStl(reader, `"${word}"`, '"facet" or "endsolid"');
    }
  }
  if (state.triangles === 0) throw nothingIn(bytes);
  const against =
    state.against > state.triangles / 100 ? { count: state.against, facet: state.first } : undefined;
  if (against) warnings.push('normals_disagree');
  return {
    format: 'stl-ascii',
    triangles: state.triangles,
    coords: state.coords.slice(0, state.triangles * 9),
    warnings,
    against,
  };
}

interface State {
  coords: Float32Array;
  triangles: number;
  against: number;
  /** First facet so counted. */
  first: number;
}

function grow(state: State, ceiling: number): void {
  const larger = new Float32Array(
    Math.max(state.coords.length + 9, Math.min(ceiling, state.coords.length * 2)),
  );
  larger.set(state.coords);
  state.coords = larger;
}

function readFacet(reader: TokenReader, state: State, normal: Float64Array): void {
  expect(reader, 'normal');
  for (let k = 0; k < 3; k++) normal[k] = coordinate(reader);
  expect(reader, 'outer');
  expect(reader, 'loop');
  const at = state.triangles * 9;
  for (let corner = 0; corner < 3; corner++) {
    expect(reader, 'vertex');
    for (let k = 0; k < 3; k++) state.coords[at + 3 * corner + k] = coordinate(reader);
  }
  expect(reader, 'endloop');
  expect(reader, 'endfacet');
  state.triangles++;
  if (!pointsAgainst(state.coords, at, normal)) return;
  if (state.against++ === 0) state.first = at / 9;
}

function pointsAgainst(c: Float32Array, at: number, normal: Float64Array): boolean {
  const [ux, uy, uz] = [c[at + 3] - c[at], c[at + 4] - c[at + 1], c[at + 5] - c[at + 2]];
  const [vx, vy, vz] = [c[at + 6] - c[at], c[at + 7] - c[at + 1], c[at + 8] - c[at + 2]];
  const [nx, ny, nz] = [uy * vz - uz * vy, uz * vx - ux * vz, ux * vy - uy * vx];
  const dot = nx * normal[0] + ny * normal[1] + nz * normal[2];
  const lengths = Math.hypot(nx, ny, nz) * Math.hypot(normal[0], normal[1], normal[2]);
  return lengths > 0 && dot < 0.5 * lengths;
}

function expect(reader: TokenReader, keyword: string): void {
  const word = reader.word();
  if (word === keyword) return;
  if (word === '' || (reader.ended() && keyword.startsWith(word))) throw cut(reader);
  throw notStl(reader, `"${word}"`, `"${keyword}"`);
}

function coordinate(reader: TokenReader): number {
  const value = reader.number();
  if (!Number.isNaN(value) || reader.saidNaN) return value;
  if (reader.ended()) throw cut(reader);
  throw notStl(reader, `"${reader.lastText().slice(0, 40)}"`, 'a number');
}

function cut(reader: TokenReader): UnusableInput {
  return new UnusableInput('truncated', `the file ends inside a facet, on line ${reader.line()}; upload it again or export it again`); // prettier-ignore
}

function notStl(reader: TokenReader, found: string, wanted: string): UnusableInput {
  return new UnusableInput('not_a_mesh', `line ${reader.line()} has ${found} where an ASCII STL has ${wanted}; export the mesh again`); // prettier-ignore
}

function nothingIn(bytes: Uint8Array): UnusableInput {
  const blank = bytes.every((byte) => byte <= 32);
  return blank
    ? new UnusableInput(
        'empty',
        'the file holds only white space; export the mesh again and upload the new file',
      )
    : new UnusableInput('no_triangles', 'the file holds no facets; export the body, not an empty selection');
}
