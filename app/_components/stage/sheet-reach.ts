import { makeSheetSampler } from '@/lib/formability/sheet/thickness-at';

/** Of the decoded sheet, what tells its thickness by place. */
export interface SampledSheet {
  positions: Float32Array;
  nodes: [number, number];
  index: Uint32Array;
  thicknessMm: Float32Array;
}

/** The sheet cuts corners of the template by about one of its elements; what lies farther off is bridged. */
const REACH_ELEMENTS = 1.25;
const REACH_MM = 0.5;

/** Thickness of the sheet that lies at a place of the template, mm; null where it bridges the place. */
export function makeReachSampler(sheet: SampledSheet): (at: readonly number[]) => number | null {
  const { positions: p, nodes, index: indices, thicknessMm } = sheet;
  const sample = makeSheetSampler({ positions: p, nodes, indices, thicknessMm });
  const reach = REACH_ELEMENTS * elementMm(sheet) + REACH_MM;
  return ([x, y, z]) => {
    const found = sample(x, y, z);
    return found.offMm <= reach ? found.thicknessMm : null;
  };
}

/** Longer side of the sheet's elements before forming. */
export function elementMm({ positions: p, nodes }: SampledSheet): number {
  const last = p.length - 3;
  return Math.max((p[last] - p[0]) / (nodes[0] - 1), (p[last + 1] - p[1]) / (nodes[1] - 1));
}
