import { UnusableInput } from '../unusable-input';

/** Largest coordinate taken, in millimetres: at 1 km a float32 steps by 0.06 mm. */
export const MAX_COORDINATE_MM = 1e6;

/** @throws UnusableInput non_finite or out_of_range, naming the first bad facet. */
export function checkCoordinates(coords: Float32Array, mmPerUnit: number): void {
  const limit = MAX_COORDINATE_MM / mmPerUnit;
  for (let i = 0; i < coords.length; i++) {
    if (!(Math.abs(coords[i]) <= limit)) refuse(coords, i, limit);
  }
}

function refuse(coords: Float32Array, i: number, limit: number): never {
  let bad = i;
  let nonFinite = 0;
  for (let k = i; k < coords.length; k++) {
    if (!Number.isFinite(coords[k])) {
      if (nonFinite++ === 0) bad = k;
    }
  }
  const axis = 'xyz'[bad % 3];
  const where = `facet ${Math.floor(bad / 9) + 1}, corner ${(Math.floor(bad / 3) % 3) + 1}, ${axis} = ${coords[bad]}`;
  if (nonFinite > 0) {
    throw new UnusableInput('non_finite', `${nonFinite} coordinates are not numbers, the first at ${where}; repair or export the mesh again`, [where]); // prettier-ignore
  }
  throw new UnusableInput('out_of_range', `a coordinate lies beyond ${limit} units (1 km): ${where}; move the part to the origin or correct its unit`, [where]); // prettier-ignore
}
