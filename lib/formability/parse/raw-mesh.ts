import type { MeshFormat, MeshWarning } from '../report';

/** Triangles as the file stores them: 9 coordinates each, in the file's unit and frame. */
export interface RawMesh {
  format: MeshFormat;
  triangles: number;
  /** 9 × triangles. */
  coords: Float32Array;
  warnings: MeshWarning[];
}
