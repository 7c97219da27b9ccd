import type { Place, Point } from './report';

/** Thickness along the surface's normal, of solid parts too; null where nothing bounds it. */
export interface WallsReport {
  /** Least thickness of walls (draft below 60°), and where. */
  minMm: number | null;
  minAt: Point | null;
  /** Thickness that 5 % and 50 % of the walls' area lie below. */
  p05Mm: number | null;
  medianMm: number | null;
  /** Least thickness of tops (draft from 60° on) of a hollow part. */
  topMm: number | null;
  /** Least thickness between the bed and a sealed cavity. */
  floorMm: number | null;
  hollow: boolean;
  /** A cavity closed all round, or closed by the bed only; vents count as closed. A part may have both. */
  sealed: boolean;
  openAtBed: boolean;
}

/** The finest solid and the finest air between two walls, measured level; null where there is none. */
export interface DetailReport {
  smallestFeatureMm: number | null;
  smallestFeatureAt: Point | null;
  smallestGapMm: number | null;
  smallestGapAt: Point | null;
}

export interface EdgesReport {
  sharpConvexMm: number;
  sharpConcaveMm: number;
  minConvexRadiusMm: number | null;
  minConcaveRadiusMm: number | null;
  places: Place[];
  /** Edges tighter than the sheet wants, the longest first. */
  lines: EdgeLine[];
}

/** An edge as a line along it (a rounded one: along its middle); at most 120 lines of at most 64 points. */
export interface EdgeLine {
  kind: 'convex' | 'concave';
  /** 0 where it is sharp. */
  radiusMm: number;
  lengthMm: number;
  points: Point[];
}
