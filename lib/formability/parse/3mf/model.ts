import type { MeshUnit } from '../../recipe';

/** Row-major 4 × 3: [x y z 1] × matrix, as 3MF writes it (Core Specification, §3.3). */
export type Matrix = readonly number[];

export interface Reference {
  objectId: string;
  /** Part of the production extension's `path`; null: the same part. */
  path: string | null;
  transform: Matrix | null;
}

export type ObjectType = 'model' | 'surface' | 'support' | 'solidsupport' | 'other';

export interface ModelObject {
  id: string;
  name: string;
  type: ObjectType;
  /** 3 × vertices, in the part's unit; views on exactly what was read. */
  vertices: Float64Array;
  /** 3 × triangles. */
  triangles: Uint32Array;
  components: Reference[];
  /** Namespace of a shape that no mesh and no component gives, or null. */
  foreign: string | null;
  /** Element and namespace of what an extension adds inside the mesh, changing its shape; null: nothing. */
  foreignInMesh: string | null;
}

export interface ModelPart {
  /** Key of the part in the archive, and its name as a message shows it. */
  key: string;
  where: string;
  /** Millimetres where the file names none (Core Specification, §3.4: the default). */
  unit: MeshUnit;
  objects: Map<string, ModelObject>;
  /** Build items in the file's order; null: marked not to be printed. */
  items: (Reference | null)[];
}
