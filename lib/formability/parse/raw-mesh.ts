import type { MeshUnit } from '../recipe';
import type { MeshFormat, MeshWarning } from '../report';

/** Triangles as the file stores them: 9 coordinates each, in the file's unit and frame. */
export interface RawMesh {
  format: MeshFormat;
  triangles: number;
  /** 9 × triangles. */
  coords: Float32Array;
  warnings: MeshWarning[];
  /** Facets whose stored normal points another way: how many, and the first; where that is worth a warning. */
  against?: { count: number; facet: number };
  /** The file's own unit, which wins over the recipe's; missing where the format has none. */
  unit?: MeshUnit;
  /** Separate bodies of the file: built objects of a 3MF, solids and shells of a STEP file. */
  bodies?: number;
  /** What of the file was left out, one sentence each. */
  leftOut?: string[];
  /** Greatest distance between curved surface and facets that the conversion was asked for. */
  deflectionMm?: number;
}
