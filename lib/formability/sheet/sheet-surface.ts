import type { Foot } from './find-foot';
import type { Membrane } from './membrane';
import type { Stretches } from './measure-elements';

/** The formed sheet for the page: template side, in the height field's own frame, millimetres. */
export interface SheetSurface {
  /** Nodes along x and y; node (i, j) is j × nodes[0] + i. */
  nodes: [number, number];
  positions: Float32Array;
  /** Three a triangle, anticlockwise from above. */
  indices: Uint32Array;
  thicknessMm: Float32Array;
  /** 1 where the sheet lies on template or bed, or is clamped. */
  contact: Uint8Array;
  /** Of each triangle: 1 where hoop against meridian stretch says web, 2 where it lies on nothing at a corner. */
  web: Uint8Array;
  /** Of each triangle: 1 where its middle lies in the foot along the bed. */
  foot: Uint8Array;
  /** Of each triangle, mm². */
  areaMm2: Float32Array;
}

export function drawSurface(sheet: Membrane, stretches: Stretches, band: Foot): SheetSurface {
  const { at, corners, free, elements } = sheet;
  const web = new Uint8Array(elements);
  const foot = new Uint8Array(elements);
  for (let e = 0; e < elements; e++) {
    const open = free[corners[3 * e]] | free[corners[3 * e + 1]] | free[corners[3 * e + 2]];
    web[e] = stretches.folded[e] | (open << 1);
    const middle = (axis: number) =>
      (at[3 * corners[3 * e] + axis] + at[3 * corners[3 * e + 1] + axis] + at[3 * corners[3 * e + 2] + axis]) / 3; // prettier-ignore
    foot[e] = band.holds(middle(0), middle(1), middle(2)) ? 1 : 0;
  }
  return {
    nodes: [sheet.nx + 1, sheet.ny + 1],
    positions: Float32Array.from(sheet.at),
    indices: Uint32Array.from(corners),
    thicknessMm: Float32Array.from(stretches.nodeThickness),
    contact: free.map((one) => 1 - one),
    web,
    foot,
    areaMm2: Float32Array.from(stretches.area),
  };
}
