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
}

export function drawSurface(sheet: Membrane, stretches: Stretches): SheetSurface {
  const { corners, free, elements } = sheet;
  const web = new Uint8Array(elements);
  for (let e = 0; e < elements; e++) {
    const open = free[corners[3 * e]] | free[corners[3 * e + 1]] | free[corners[3 * e + 2]];
    web[e] = stretches.folded[e] | (open << 1);
  }
  return {
    nodes: [sheet.nx + 1, sheet.ny + 1],
    positions: Float32Array.from(sheet.at),
    indices: Uint32Array.from(corners),
    thicknessMm: Float32Array.from(stretches.nodeThickness),
    contact: free.map((one) => 1 - one),
    web,
  };
}
