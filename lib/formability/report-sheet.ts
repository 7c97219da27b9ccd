import type { Point } from './report';

/** A zone of the formed sheet: the part itself, or the foot along the bed. */
export interface SheetZone {
  /** Least thickness over a disc of 3 mm, as far as that lies in the zone. */
  minMm: number;
  minAt: Point;
  place: 'flat' | 'wall' | 'inner-corner' | 'pit' | 'web';
  /** Honest margin of the model at that place. */
  marginPercent: number;
  /** Thickness that 5 % of the zone lies below. */
  q05Mm: number;
  areaMm2: number;
  belowLimitAreaMm2: number;
  /** Change of minMm against a run at half the nodes; above marginPercent the figure is the mesh's as much as the sheet's. */
  meshErrorPercent: number;
}

/** The membrane run; null where the sheet was not asked for or could not be formed. */
export interface SheetReport {
  /** Anywhere, the foot included; `part` and `foot` tell the two apart. */
  minMm: number;
  minAt: Point;
  meanMm: number;
  q01Mm: number;
  q05Mm: number;
  belowLimitAreaMm2: number;
  webAreaMm2: number;
  unclosedAreaMm2: number;
  volumeErrorPercent: number;
  nodes: [number, number];
  steps: number;
  meshErrorPercent: number;
  marginPercent: number;
  converged: boolean;
  /** All above the foot, and bed level that the template encloses; null where the template is lower than any foot. */
  part: SheetZone | null;
  /** Bed level outside: what is trimmed off, unless the flange is kept. */
  foot: SheetZone | null;
  /** How high the foot reaches above the bed. */
  footHeightMm: number;
}
