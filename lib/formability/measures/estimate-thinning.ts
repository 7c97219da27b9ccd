import { drapedShare, skirtShare } from '../physics/drape-rules';
import type { AirTrap, PlanReport, Point, Spacing } from '../report';
import type { ThinningEstimate } from '../report-forming';
import type { ThicknessAt } from '../sheet/thickness-at';
import {
  coneThinning,
  cylinderCornerThinning,
  domeMean,
  domePole,
  ridgeThinning,
  truncatedConeThinning,
  wedgeThinning,
} from '../sheet/thinning-rules';

/** Places are looked at this far from a corner, mm: half of the disc over which the run of the sheet takes its mean. */
const BESIDE_MM = 1.5;
/** Floors below this share of the mouth's radius are points, above the other straight walls. */
const [POINTED, STRAIGHT] = [0.05, 0.97];
/** Sides of a groove meet where its foot is below this share of its opening. */
const GROOVE = 0.1;
const MOST_PITS = 12;

/**
 * The classical rules for a free sheet of even thickness that freezes where it touches, beside the membrane: skirt, foot of
 * the outer wall, each pit taken as a round one of its area and volume, the tightest groove. A cross-check, 20 to 60 % off
 * in round and deep places, and a first figure where the sheet was not run.
 */
export function estimateThinning(
  part: { traps: AirTrap[]; spacing: Spacing[]; plan: PlanReport; size: Point; topAreaMm2: number },
  gaugeMm: number,
  thicknessAt: ThicknessAt | null,
): ThinningEstimate[] {
  const { traps, spacing, plan, size, topAreaMm2 } = part;
  const beside = (at: Point) => {
    const found = thicknessAt ? thicknessAt(...at) : NaN;
    return found > 0 ? found : null;
  };
  const found: ThinningEstimate[] = [];
  const gap = Math.min(plan.frameMm[0] - size[0], plan.frameMm[1] - size[1]) / 2;
  const height = size[2];
  if (topAreaMm2 < plan.frameAreaMm2 && plan.frameAreaMm2 <= plan.formedAreaMm2) {
    const share = skirtShare(plan.frameAreaMm2, topAreaMm2, plan.formedAreaMm2);
    found.push({ rule: 'skirt', at: null, ruleMm: gaugeMm * share, sheetMm: null });
  }
  if (gap > 0 && height > 0) {
    found.push(
      height >= gap && height > BESIDE_MM
        ? { rule: 'foot', at: null, ruleMm: gaugeMm * ridgeThinning(gap, height, BESIDE_MM), sheetMm: null }
        : { rule: 'drape', at: null, ruleMm: gaugeMm * drapedShare(gap, height), sheetMm: null },
    );
  }
  const parents = new Set(traps.map((trap) => trap.parent));
  const pits = traps.filter((_, id) => !parents.has(id)).sort((a, b) => b.volumeMm3 - a.volumeMm3);
  for (const trap of pits.slice(0, MOST_PITS)) {
    const pit = thinningOfPit(trap);
    if (!pit) continue;
    const at = trap.floor;
    found.push({ rule: pit.rule, at, ruleMm: gaugeMm * pit.share, sheetMm: beside(at) });
  }
  const grooves = spacing.filter((pair) => pair.gapAtBedMm < GROOVE * pair.gapMm && pair.gapMm > 0);
  const deepest = grooves.sort((a, b) => b.heightMm / b.gapMm - a.heightMm / a.gapMm)[0];
  if (deepest) {
    const half = deepest.gapMm / 2;
    const wallDeg = (Math.atan2(deepest.heightMm, half) * 180) / Math.PI;
    const share = wedgeThinning(wallDeg, Math.min(1, BESIDE_MM / half));
    found.push({ rule: 'groove', at: deepest.between[0], ruleMm: gaugeMm * share, sheetMm: null });
  }
  return found;
}

/** The pit as a round one of its area and volume: a cylinder, a cone, cut off or not, or too shallow for its walls to matter. */
export function thinningOfPit(
  trap: Pick<AirTrap, 'floor' | 'spillZMm' | 'volumeMm3' | 'planAreaMm2'>,
): { rule: ThinningEstimate['rule']; share: number } | null {
  const depth = trap.spillZMm - trap.floor[2];
  const mouth = Math.sqrt(trap.planAreaMm2 / Math.PI);
  if (!(depth > 0) || !(mouth > BESIDE_MM)) return null;
  // V = π d / 3 (R² + R r + r²).
  const rest = (3 * trap.volumeMm3) / (Math.PI * depth) - mouth * mouth;
  const floor = Math.min(mouth, (Math.sqrt(Math.max(0, mouth * mouth + 4 * rest)) - mouth) / 2);
  const wallDeg = (Math.atan2(depth, mouth - Math.max(0, floor)) * 180) / Math.PI;
  if (!(floor > POINTED * mouth))
    return { rule: 'pit-cone', share: coneThinning(wallDeg, Math.min(1, BESIDE_MM / mouth)) };
  if (floor >= STRAIGHT * mouth && depth >= mouth)
    return { rule: 'pit-cylinder', share: cylinderCornerThinning(mouth, depth, Math.min(mouth, BESIDE_MM)) };
  const wall = (wallDeg * Math.PI) / 180;
  const reaches = floor * (1 + Math.cos(wall)) <= mouth && floor < STRAIGHT * mouth;
  if (reaches) {
    const corner = Math.min(BESIDE_MM, floor / Math.tan(wall / 2));
    return { rule: 'pit-frustum', share: truncatedConeThinning(mouth, floor, wallDeg, corner) };
  }
  // The cap meets the floor before it has slid down the walls: between its mean and its pole.
  const rise = Math.min(1, depth / mouth);
  return { rule: 'pit-shallow', share: (domeMean(rise) + domePole(rise)) / 2 };
}
