import { makeSheet, type Membrane } from '@/lib/formability/sheet/membrane';

/**
 * A disc about the origin, clamped at its rim, level at z: squares become circles along rays from the centre. (The smooth
 * elliptical map is singular at the corners and spoils convergence.)
 */
export function makeDisc(radius: number, cells: number, z = 0): Membrane {
  const place = (i: number, j: number): [number, number] => {
    const u = (2 * i) / cells - 1;
    const v = (2 * j) / cells - 1;
    const far = Math.sqrt(u * u + v * v);
    const scale = far === 0 ? 0 : (radius * Math.max(Math.abs(u), Math.abs(v))) / far;
    return [u * scale, v * scale];
  };
  const cell = (2 * radius) / cells;
  return makeSheet(cells, cells, cell, cell, place, z);
}
