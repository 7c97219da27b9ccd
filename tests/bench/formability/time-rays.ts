import { BufferAttribute, BufferGeometry, DoubleSide, Ray, Vector3 } from 'three';
import { MeshBVH } from 'three-mesh-bvh';
import { makeGrid } from '@/lib/formability/dexel/grid';
import { benchMesh } from './bench-mesh';

export interface RayTimes {
  buildMs: number;
  raysMs: number;
  hits: number;
}

/** The plain way to the same columns: a bounding-volume tree, and every hit of one upward ray a cell. */
function timeRays(size: number): RayTimes {
  const mesh = Float32Array.from(benchMesh(size));
  const low = [Infinity, Infinity];
  const high = [-Infinity, -Infinity];
  for (let i = 0; i < mesh.length; i += 3) {
    for (let k = 0; k < 2; k++) {
      low[k] = Math.min(low[k], mesh[i + k]);
      high[k] = Math.max(high[k], mesh[i + k]);
    }
  }
  const grid = makeGrid(low, high, null);
  const geometry = new BufferGeometry();
  geometry.setAttribute('position', new BufferAttribute(mesh, 3));
  const began = performance.now();
  const bvh = new MeshBVH(geometry);
  const built = performance.now();
  const ray = new Ray(new Vector3(), new Vector3(0, 0, 1));
  let hits = 0;
  for (let j = 0; j < grid.ny; j++) {
    for (let i = 0; i < grid.nx; i++) {
      ray.origin.set(grid.x0 + (i + 0.5) * grid.cell, grid.y0 + (j + 0.5) * grid.cell, -1);
      hits += bvh.raycast(ray, DoubleSide).length;
    }
  }
  return { buildMs: built - began, raysMs: performance.now() - built, hits };
}

process.stdout.write(JSON.stringify(timeRays(Number(process.argv[2]))));
