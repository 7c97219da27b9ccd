/**
 * An indexed triangle mesh in the engine's frame: millimetres, standing on the bed, x and y relative to
 * `centre` so that sums keep their digits far from the origin.
 */
export interface Mesh {
  triangles: number;
  vertices: number;
  /** 3 × triangles. */
  index: Uint32Array;
  /** 3 × vertices. */
  position: Float64Array;
  /** Added to x and y to come back to the file's frame. */
  centre: [number, number];
}
