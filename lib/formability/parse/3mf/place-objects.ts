import { UnusableInput } from '../../unusable-input';
import { MM_PER_UNIT } from '../../recipe';
import { checkTriangles, MAX_TRIANGLES } from '../size-caps';
import { MAX_COMPONENT_DEPTH, MAX_PLACED } from './limits';
import type { Matrix, ModelObject, ModelPart, Reference } from './model';
import { determinant, multiply } from './model-values';

/** A mesh where the build puts it. */
interface Placed {
  object: ModelObject;
  transform: Matrix | null;
}

export interface Assembled {
  coords: Float32Array;
  triangles: number;
  bodies: number;
  leftOut: string[];
}

/** Finds the part that a reference leads to, reading it on first use. */
export type LoadPart = (path: string, owner: string) => ModelPart;

/**
 * The build of the start part as triangles: every item, through its components, with all transforms, in that part's unit; a mirroring
 * transform turns the facets' winding. Objects of type `model` and `surface` are the template. `support` and
 * `solidsupport` hold it while it prints and are broken away, `other` is not printed at all (Core Specification,
 * §4.1; from memory): they are left out, with all that they consist of, and named in `leftOut`; so are items that are
 * marked not to be printed.
 * @throws UnusableInput no_triangles, not_a_mesh (cycle, missing object), unsupported, too_large_file
 */
export function placeObjects(start: ModelPart, loadPart: LoadPart): Assembled {
  const walk = new Walk(start, loadPart);
  start.items.forEach((item, k) => {
    const owner = `build item ${k + 1} of ${start.where}`;
    if (item === null) walk.leave(`${owner}, marked not to be printed`);
    else walk.follow(start, item, null, owner);
  });
  const { placed, leftOut } = walk;
  let triangles = 0;
  for (const { object } of placed) triangles += object.triangles.length / 3;
  checkTriangles(triangles, start.where);
  const left = [...leftOut].map(([what, count]) => (count === 1 ? what : `${what} (${count} times)`));
  if (triangles === 0) {
    const why = start.items.length === 0 ? 'puts nothing into its build' : left.length > 0 ? `builds only what is no part of the template: ${left.join(', ')}` : 'builds no triangles'; // prettier-ignore
    throw new UnusableInput('no_triangles', `${start.where} ${why}; export the body, not an empty selection`);
  }
  const coords = new Float32Array(9 * triangles);
  let at = 0;
  for (const one of placed) at = write(one, coords, at);
  return { coords, triangles, bodies: placed.length, leftOut: left };
}

class Walk {
  readonly placed: Placed[] = [];
  readonly leftOut = new Map<string, number>();
  private readonly path: ModelObject[] = [];
  private steps = 0;
  private triangles = 0;

  constructor(
    private readonly start: ModelPart,
    private readonly loadPart: LoadPart,
  ) {}

  follow(from: ModelPart, reference: Reference, outer: Matrix | null, owner: string): void {
    if (reference.path !== null && from !== this.start) {
      throw new UnusableInput('not_a_mesh', `${owner} points into another part, which only the start part may (3MF Production Extension, §3.1.2); export the 3MF again`); // prettier-ignore
    }
    const part = reference.path === null ? from : this.loadPart(reference.path, owner);
    const object = part.objects.get(reference.objectId);
    if (!object) {
      throw new UnusableInput('not_a_mesh', `${owner} asks for object ${reference.objectId}, which ${part.where} does not have; export the 3MF again`); // prettier-ignore
    }
    const named = `object ${object.id} of ${part.where}`;
    if (this.path.includes(object)) {
      throw new UnusableInput('not_a_mesh', `${named} is a component of itself; export the 3MF again`);
    }
    if (this.path.length >= MAX_COMPONENT_DEPTH) {
      throw new UnusableInput('unsupported', `${named} lies more than ${MAX_COMPONENT_DEPTH} components deep; export the template as one mesh`); // prettier-ignore
    }
    if (++this.steps > MAX_PLACED) {
      throw new UnusableInput('too_large_file', `${this.start.where} builds more than ${MAX_PLACED} components; export the template as one mesh`); // prettier-ignore
    }
    if (object.type !== 'model' && object.type !== 'surface') {
      return this.leave(`${named}, of type ${object.type}`);
    }
    const inOwnUnit =
      part.unit === from.unit ? null : scaling(MM_PER_UNIT[part.unit] / MM_PER_UNIT[from.unit]);
    const transform = multiply(multiply(inOwnUnit, reference.transform), outer);
    if (object.components.length === 0) return this.place(object, transform, named);
    this.path.push(object);
    for (const component of object.components)
      this.follow(part, component, transform, `a component of ${named}`);
    this.path.pop();
  }

  private place(object: ModelObject, transform: Matrix | null, named: string): void {
    if (object.triangles.length === 0 && object.foreign !== null) {
      throw new UnusableInput('unsupported', `${named} has no mesh but a shape of the extension ${object.foreign.slice(0, 200)}, which is not read here; export it as a plain mesh (3MF core)`); // prettier-ignore
    }
    if (object.foreignInMesh !== null) {
      throw new UnusableInput('unsupported', `${named} has ${object.foreignInMesh} inside its mesh, an extension's shape that is not read here; export it as a plain mesh (3MF core)`); // prettier-ignore
    }
    this.triangles += object.triangles.length / 3;
    if (this.triangles > MAX_TRIANGLES) checkTriangles(this.triangles, this.start.where);
    if (object.triangles.length > 0) this.placed.push({ object, transform });
  }

  leave(what: string): void {
    if (this.leftOut.size < 20 || this.leftOut.has(what)) {
      this.leftOut.set(what, (this.leftOut.get(what) ?? 0) + 1);
    }
  }
}

function scaling(factor: number): Matrix {
  return [factor, 0, 0, 0, factor, 0, 0, 0, factor, 0, 0, 0];
}

function write({ object, transform }: Placed, coords: Float32Array, from: number): number {
  const { vertices, triangles } = object.triangles.length < object.vertices.length ? compact(object) : object;
  const points = transform ? transformed(vertices, transform) : vertices;
  const mirrored = transform !== null && determinant(transform) < 0;
  const [second, third] = mirrored ? [2, 1] : [1, 2];
  let at = from;
  for (let t = 0; t < triangles.length; t += 3) {
    const a = 3 * triangles[t];
    const b = 3 * triangles[t + second];
    const c = 3 * triangles[t + third];
    coords[at] = points[a];
    coords[at + 1] = points[a + 1];
    coords[at + 2] = points[a + 2];
    coords[at + 3] = points[b];
    coords[at + 4] = points[b + 1];
    coords[at + 5] = points[b + 2];
    coords[at + 6] = points[c];
    coords[at + 7] = points[c + 1];
    coords[at + 8] = points[c + 2];
    at += 9;
  }
  return at;
}

/** Only the vertices that triangles use, so that placing costs by triangles and not by what lies about. */
function compact({ vertices, triangles }: ModelObject): Pick<ModelObject, 'vertices' | 'triangles'> {
  const used = new Float64Array(3 * triangles.length);
  for (let c = 0; c < triangles.length; c++) {
    for (let k = 0; k < 3; k++) used[3 * c + k] = vertices[3 * triangles[c] + k];
  }
  return { vertices: used, triangles: Uint32Array.from(triangles, (_, c) => c) };
}

function transformed(vertices: Float64Array, m: Matrix): Float64Array {
  const out = new Float64Array(vertices.length);
  for (let i = 0; i < vertices.length; i += 3) {
    const [x, y, z] = [vertices[i], vertices[i + 1], vertices[i + 2]];
    out[i] = x * m[0] + y * m[3] + z * m[6] + m[9];
    out[i + 1] = x * m[1] + y * m[4] + z * m[7] + m[10];
    out[i + 2] = x * m[2] + y * m[5] + z * m[8] + m[11];
  }
  return out;
}
