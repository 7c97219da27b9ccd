import { UnusableInput } from '../../unusable-input';
import { parseNumber, readDecimal } from '../decimal';
import { MAX_TRIANGLES } from '../size-caps';
import { checkExtensions, CORE, HARMLESS, PRODUCTION } from './extensions';
import { Growing } from './growing';
import { MAX_COMPONENTS, MAX_NAME, MAX_OBJECTS, MAX_PATH } from './limits';
import type { ModelObject, ModelPart, ObjectType, Reference } from './model';
import { readMatrix, readUnit } from './model-values';
import { decode, type Tag } from './xml-tag';
import type { XmlHandler } from './xml-scanner';

/** What an element is, where it stands; everything the core specification does not name there is passed over. */
const enum Kind {
  Other,
  Model,
  Resources,
  Build,
  Item,
  Object,
  Mesh,
  Vertices,
  Vertex,
  Triangles,
  Triangle,
  Components,
  Component,
}

const CHILDREN: Partial<Record<Kind, Record<string, Kind>>> = {
  [Kind.Model]: { resources: Kind.Resources, build: Kind.Build },
  [Kind.Resources]: { object: Kind.Object },
  [Kind.Build]: { item: Kind.Item },
  [Kind.Object]: { mesh: Kind.Mesh, components: Kind.Components },
  [Kind.Mesh]: { vertices: Kind.Vertices, triangles: Kind.Triangles },
  [Kind.Vertices]: { vertex: Kind.Vertex },
  [Kind.Triangles]: { triangle: Kind.Triangle },
  [Kind.Components]: { component: Kind.Component },
};

const TYPES: ObjectType[] = ['model', 'surface', 'support', 'solidsupport', 'other'];
const utf8 = (text: string) => new TextEncoder().encode(text);
const AXES = ['x', 'y', 'z'].map(utf8);
const CORNERS = ['v1', 'v2', 'v3'].map(utf8);

/** Objects and components read so far in all parts of the file: one count against their caps. */
export interface Tally {
  objects: number;
  components: number;
  vertices: number;
  triangles: number;
}

/**
 * Takes the elements of one model part (3MF Core Specification 1.3, chapters 3 and 4; Production Extension 1.1, §3.1):
 * objects with meshes or components, build items. Metadata, materials and whatever else stands there is passed over.
 * @throws UnusableInput not_a_mesh, non_finite, unsupported, too_large_file; part, object, index named
 */
export class ModelReader implements XmlHandler {
  readonly part: ModelPart;
  private readonly kinds: Kind[] = [];
  private object: ModelObject | null = null;
  private vertices = new Growing(new Float64Array(0), 0);
  private triangles = new Growing(new Uint32Array(0), 0);
  private highest = -1;
  private highestAt = 0;
  private hasMesh = false;

  constructor(
    key: string,
    private readonly where: string,
    private readonly tally: Tally,
  ) {
    this.part = { key, where, unit: 'mm', objects: new Map(), items: [] };
  }

  open(tag: Tag): void {
    const parent = this.kinds.length > 0 ? this.kinds[this.kinds.length - 1] : null;
    const kind = parent === null ? this.root(tag) : this.kindOf(parent, tag);
    this.kinds.push(kind);
    if (kind === Kind.Vertex) this.vertex(tag);
    else if (kind === Kind.Triangle) this.triangle(tag);
    else if (kind === Kind.Object) this.begin(tag);
    else if (kind === Kind.Mesh) this.beginMesh();
    else if (kind === Kind.Component) this.component(tag);
    else if (kind === Kind.Item) this.item(tag);
    else if (kind === Kind.Other) this.other(parent, tag);
  }

  close(): void {
    const kind = this.kinds.pop();
    if (kind === Kind.Mesh) this.endMesh();
    else if (kind === Kind.Object) this.endObject();
  }

  /** A shape by an extension: instead of a mesh, or added inside one, whether the file calls it required or not. */
  private other(parent: Kind | null, tag: Tag): void {
    if (!this.object || tag.uri === CORE) return;
    if (parent === Kind.Object) this.object.foreign = tag.uri;
    else if (parent === Kind.Mesh && !HARMLESS.has(tag.uri)) {
      this.object.foreignInMesh ??= `<${tag.local.slice(0, 40)}> of "${tag.uri.slice(0, 200)}"`;
    }
  }

  private root(tag: Tag): Kind {
    if (tag.local !== 'model' || tag.uri !== CORE) {
      throw new UnusableInput('not_a_mesh', `${this.where} is no 3MF model: its root is <${tag.local.slice(0, 40)}> of "${tag.uri.slice(0, 120)}"; export the 3MF again`); // prettier-ignore
    }
    this.part.unit = readUnit(tag.attribute('unit'), this.where);
    checkExtensions(tag, this.where);
    return Kind.Model;
  }

  private kindOf(parent: Kind, tag: Tag): Kind {
    if (tag.uri !== CORE) return Kind.Other;
    if (parent === Kind.Vertices && tag.local === 'vertex') return Kind.Vertex;
    if (parent === Kind.Triangles && tag.local === 'triangle') return Kind.Triangle;
    const known = CHILDREN[parent];
    return known && Object.hasOwn(known, tag.local) ? known[tag.local] : Kind.Other;
  }

  private begin(tag: Tag): void {
    if (++this.tally.objects > MAX_OBJECTS) throw this.tooMany('objects', MAX_OBJECTS);
    const id = this.id(tag.attribute('id'), `an object of ${this.where}`, 'id');
    if (this.part.objects.has(id)) throw this.wrong(`${this.where} has two objects with the id ${id}`);
    const type = tag.attribute('type') ?? 'model';
    const known = TYPES.find((one) => one === type);
    if (!known) throw this.wrong(`object ${id} of ${this.where} has the type "${type.slice(0, 40)}", which 3MF does not know`); // prettier-ignore
    this.object = {
      id,
      name: kept(tag.attribute('name') ?? ''),
      type: known,
      vertices: new Float64Array(0),
      triangles: new Uint32Array(0),
      components: [],
      foreign: null,
      foreignInMesh: null,
    };
    this.hasMesh = false;
  }

  private endObject(): void {
    const object = this.object as ModelObject;
    if (this.hasMesh && object.components.length > 0)
      throw this.wrong(`${this.owner()} has a mesh and components`);
    this.part.objects.set(object.id, object);
    this.object = null;
  }

  private beginMesh(): void {
    if (this.hasMesh) throw this.wrong(`${this.owner()} has two meshes`);
    this.hasMesh = true;
    this.vertices = new Growing(new Float64Array(0), 3 * (MAX_TRIANGLES - this.tally.vertices));
    this.triangles = new Growing(new Uint32Array(0), 3 * (MAX_TRIANGLES - this.tally.triangles));
    this.highest = -1;
  }

  private endMesh(): void {
    const object = this.object as ModelObject;
    object.vertices = this.vertices.view();
    object.triangles = this.triangles.view();
    const count = object.vertices.length / 3;
    this.tally.vertices += count;
    this.tally.triangles += object.triangles.length / 3;
    if (this.highest < count) return;
    throw this.wrong(`${this.owner()} has ${count} vertices, and its triangle ${Math.floor(this.highestAt / 3) + 1} points at vertex ${this.highest} (counted from 0)`); // prettier-ignore
  }

  private vertex(tag: Tag): void {
    const { vertices } = this;
    if (!vertices.room()) throw this.tooMany('vertices', MAX_TRIANGLES);
    for (let k = 0; k < 3; k++) {
      const at = tag.find(AXES[k], k);
      let value = at < 0 ? NaN : readDecimal(tag.bytes, tag.from(at), tag.to(at));
      if (Number.isNaN(value)) value = this.slowCoordinate(tag, at, k);
      vertices.data[vertices.length++] = value;
    }
  }

  private slowCoordinate(tag: Tag, at: number, axis: number): number {
    const owner = `vertex ${Math.floor(this.vertices.length / 3)} of ${this.owner()}`;
    if (at < 0) throw this.wrong(`${owner} has no ${'xyz'[axis]}`);
    const text = tag.value(at).trim();
    const value = parseNumber(text);
    if (value === null)
      throw this.wrong(`${owner} has ${'xyz'[axis]} = "${text.slice(0, 40)}", which is no number`);
    if (Number.isFinite(value)) return value;
    throw new UnusableInput('non_finite', `${owner} has ${'xyz'[axis]} = ${text.slice(0, 40)}; repair or export the mesh again`); // prettier-ignore
  }

  private triangle(tag: Tag): void {
    const { triangles } = this;
    if (!triangles.room()) throw this.tooMany('triangles', MAX_TRIANGLES);
    for (let k = 0; k < 3; k++) {
      const at = tag.find(CORNERS[k], k);
      let value = at < 0 ? -1 : readIndex(tag.bytes, tag.from(at), tag.to(at));
      if (value < 0) value = this.slowIndex(tag, at, k);
      if (value > this.highest) {
        this.highest = value;
        this.highestAt = triangles.length;
      }
      triangles.data[triangles.length++] = value;
    }
  }

  private slowIndex(tag: Tag, at: number, corner: number): number {
    const owner = `triangle ${Math.floor(this.triangles.length / 3) + 1} of ${this.owner()}`;
    if (at < 0) throw this.wrong(`${owner} has no v${corner + 1}`);
    const text = tag.value(at).trim();
    const value = /^\+?\d+$/.test(text) ? Number(text) : NaN;
    if (value <= 0xffffffff) return value;
    if (value > 0 || /^-\d+$/.test(text)) throw this.wrong(`${owner} points at vertex ${text.slice(0, 40)}`);
    throw this.wrong(`${owner} has v${corner + 1} = "${text.slice(0, 40)}", which is no index`);
  }

  private component(tag: Tag): void {
    if (++this.tally.components > MAX_COMPONENTS) throw this.tooMany('components', MAX_COMPONENTS);
    this.object?.components.push(this.reference(tag, `a component of ${this.owner()}`));
  }

  private item(tag: Tag): void {
    if (++this.tally.components > MAX_COMPONENTS) throw this.tooMany('build items', MAX_COMPONENTS);
    const owner = `build item ${this.part.items.length + 1} of ${this.where}`;
    // Slicers write this attribute for what stays on the plate unprinted; the core specification has no such word.
    this.part.items.push(tag.attribute('printable') === '0' ? null : this.reference(tag, owner));
  }

  private reference(tag: Tag, owner: string): Reference {
    const path = tag.foreign(PRODUCTION, 'path');
    if (path !== null && path.length > MAX_PATH) {
      throw this.wrong(`${owner} has a path of ${path.length} characters, more than the ${MAX_PATH} of a part's name`); // prettier-ignore
    }
    return {
      objectId: this.id(tag.attribute('objectid'), owner, 'objectid'),
      path,
      transform: readMatrix(tag.attribute('transform'), owner),
    };
  }

  private id(text: string | null, owner: string, attribute: string): string {
    const id = text?.trim();
    if (id !== undefined && /^\+?\d{1,10}$/.test(id)) return String(Number(id));
    throw this.wrong(
      `${owner} has ${id === undefined ? `no ${attribute}` : `the ${attribute} "${id.slice(0, 40)}"`}`,
    );
  }

  private owner(): string {
    const { id, name } = this.object as ModelObject;
    const called = name === '' ? '' : ` ("${name.slice(0, 40).replace(/\s+/g, ' ')}")`;
    return `object ${id}${called} of ${this.where}`;
  }

  private wrong(what: string): UnusableInput {
    return new UnusableInput('not_a_mesh', `${what}; export the 3MF again`);
  }

  private tooMany(what: string, most: number): UnusableInput {
    return new UnusableInput('too_large_file', `${this.where} has more ${what} than the ${most} that are read; export the mesh with a coarser tolerance`); // prettier-ignore
  }
}

/** The start of a name, copied: a mere slice would hold on to all of a long one, for each of many objects. */
function kept(name: string): string {
  if (name.length <= MAX_NAME) return name;
  const bytes = utf8(name.slice(0, MAX_NAME));
  return decode(bytes, 0, bytes.length);
}

/** A plain row of up to nine digits; -1 for anything else. */
function readIndex(bytes: Uint8Array, from: number, to: number): number {
  if (to <= from || to - from > 9) return -1;
  let value = 0;
  for (let i = from; i < to; i++) {
    const digit = bytes[i] - 48;
    if (digit < 0 || digit > 9) return -1;
    value = value * 10 + digit;
  }
  return value;
}
