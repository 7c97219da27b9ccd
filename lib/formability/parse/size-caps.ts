import { UnusableInput } from '../unusable-input';

/** Largest file that is read at all, in bytes: about 12 million facets of binary STL. */
export const MAX_FILE_BYTES = 600_000_000;
/** Most facets of one part, whatever the format: 432 MB of coordinates. */
export const MAX_TRIANGLES = 12_000_000;
/** Largest STEP file: its conversion needs many times its bytes in memory. */
export const MAX_STEP_BYTES = 100_000_000;

/** @throws UnusableInput too_large_file where a part would have more facets than are read. */
export function checkTriangles(count: number, where: string): void {
  if (count <= MAX_TRIANGLES) return;
  throw new UnusableInput('too_large_file', `${where} has ${count} facets, more than the ${MAX_TRIANGLES} that are read; export it with a coarser tolerance`); // prettier-ignore
}
