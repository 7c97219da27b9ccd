import { FLAT_FROM_DEG } from './draft-scale';
import type { Section, SectionPoint, SectionSegment } from './section';

/** A straight run of the outline. */
export interface SectionWall {
  from: SectionPoint;
  to: SectionPoint;
  lengthMm: number;
  /** length-weighted mean of the facets cut, degrees */
  draftDeg: number;
  kind: 'wall' | 'flat' | 'underside' | 'bed';
}

const SAME_DIRECTION_DEG = 1;
const SAME_DRAFT_DEG = 1;
const BED_MM = 1e-3;

/** The outlines as straight runs: neighbouring segments in one direction and of one draft are one wall. */
export function findSectionWalls(section: Section): SectionWall[] {
  return section.loops.flatMap(({ segments, closed }) => {
    const runs: SectionSegment[][] = [];
    for (const segment of segments) {
      const run = runs[runs.length - 1];
      if (run && continues(run, segment)) run.push(segment);
      else runs.push([segment]);
    }
    const last = runs[runs.length - 1];
    if (closed && runs.length > 1 && continues(last, runs[0][0])) runs[0] = [...runs.pop()!, ...runs[0]];
    return runs.map(toWall);
  });
}

function continues(run: SectionSegment[], next: SectionSegment): boolean {
  const a = direction(run[0].from, run[run.length - 1].to);
  const turn = Math.abs(((direction(next.from, next.to) - a + 540) % 360) - 180);
  return (
    turn <= SAME_DIRECTION_DEG && Math.abs(run[run.length - 1].draftDeg - next.draftDeg) <= SAME_DRAFT_DEG
  );
}

function direction(from: SectionPoint, to: SectionPoint): number {
  return (Math.atan2(to[1] - from[1], to[0] - from[0]) * 180) / Math.PI;
}

function toWall(run: SectionSegment[]): SectionWall {
  const from = run[0].from;
  const to = run[run.length - 1].to;
  let length = 0;
  let draft = 0;
  for (const { from: a, to: b, draftDeg } of run) {
    const l = Math.hypot(b[0] - a[0], b[1] - a[1]);
    length += l;
    draft += draftDeg * l;
  }
  const draftDeg = length > 0 ? draft / length : run[0].draftDeg;
  return {
    from,
    to,
    lengthMm: Math.hypot(to[0] - from[0], to[1] - from[1]),
    draftDeg,
    kind: kindOf(from, to, draftDeg),
  };
}

function kindOf(from: SectionPoint, to: SectionPoint, draftDeg: number): SectionWall['kind'] {
  if (draftDeg < -0.25) return Math.abs(from[1]) <= BED_MM && Math.abs(to[1]) <= BED_MM ? 'bed' : 'underside';
  return draftDeg >= FLAT_FROM_DEG ? 'flat' : 'wall';
}
