import type { Grid } from './grid';

/**
 * The cells that are joined to one by their sides (4 neighbours) through cells that `takes` holds for; the first is taken
 * as it is.
 * @returns the cells in the order in which they were reached, and 1 in `seen` for each of them
 */
export function floodFrom(
  { nx, ny }: Grid,
  first: number,
  takes: (cell: number) => boolean,
): { cells: Int32Array; seen: Uint8Array } {
  const seen = new Uint8Array(nx * ny);
  const cells = new Int32Array(nx * ny);
  let end = 1;
  cells[0] = first;
  seen[first] = 1;
  const visit = (c: number) => {
    if (seen[c] || !takes(c)) return;
    seen[c] = 1;
    cells[end++] = c;
  };
  for (let at = 0; at < end; at++) {
    const c = cells[at];
    const i = c % nx;
    if (i > 0) visit(c - 1);
    if (i + 1 < nx) visit(c + 1);
    if (c >= nx) visit(c - nx);
    if (c < nx * (ny - 1)) visit(c + nx);
  }
  return { cells: cells.subarray(0, end), seen };
}
