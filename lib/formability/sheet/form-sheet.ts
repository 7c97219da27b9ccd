import type { Point } from '../report';
import type { SheetReport, SheetZone } from '../report-sheet';
import { UnusableInput } from '../unusable-input';
import { drapeAndPress, type Drape } from './drape-and-press';
import { findFoot, type Foot } from './find-foot';
import { DISC_MM, findThinnest } from './find-thinnest';
import { judgePlace, marginPercent, type PlaceKind } from './judge-place';
import { measureElements, type Stretches } from './measure-elements';
import { measureZone, type ZoneFigures } from './measure-zone';
import { makeRectangle, type Membrane } from './membrane';
import { makeObstacle, type Obstacle } from './obstacle';
import { planDrape } from './plan-drape';
import { checkSheetInput, placeFrame, type SheetInput, type SheetOptions } from './sheet-input';
import { snapToPlateau } from './snap-to-plateau';
import { drawSurface, type SheetSurface } from './sheet-surface';
import { makeThicknessAt, type ThicknessAt } from './thickness-at';
import { areaQuantile, orderByThickness } from './area-quantile';

/** How the run ended: only `converged` figures are sure to be the model's. */
export type SheetOutcome = 'converged' | 'not-settled' | 'volume-lost';

export interface FormedSheet {
  report: SheetReport;
  outcome: SheetOutcome;
  /** Greatest force on a free node when the frame had landed, in μ t0 × element side. */
  residual: number;
  iterations: number;
  /** p / (μ t0) at the end, per mm. */
  pressureRatio: number;
  /** Sides of an element before forming, mm. */
  elementMm: [number, number];
  formedAreaMm2: number;
  minPlace: PlaceKind;
  /** Area in folds when the frame had landed, before pressure pulls them straight or presses them flat, mm². */
  hangingWebMm2: number;
  /** Largest fold left and largest place that the sheet does not reach, if any. */
  webAt: Point | null;
  surface: SheetSurface;
  thicknessAt: ThicknessAt;
}

const USUAL_NODES = 128;
const PREVIEW_NODES = 64;
/** Relative change of the sheet's volume that rings the alarm (engine contract). */
const VOLUME_ALARM = 1e-6;
/** Residual up to which a landed sheet passes for settled, μ t0 × element side. */
const SETTLED = 5e-3;
/** What counts as a tight corner, mm. */
const TIGHT_MM = 3;
/** Share of the work that the run at half the nodes takes. */
const HALF_SHARE = 0.2;

/**
 * Thickness of the formed sheet: a hyperelastic membrane clamped in the frame, template raised into it, then pressed
 * on, sticking where it touches; run at half the nodes as well, whose difference is the mesh error. An estimate, to be
 * proven by a test pull: slip, cooling, inertia, bending and contact of webs with themselves are left out, and below
 * an overhang the sheet hangs straight down.
 *
 * Speed: tests/bench/formability/sheet.ts prints it.
 * @throws UnusableInput invalid_recipe, stopped
 */
export function formSheet(input: SheetInput, options: SheetOptions = {}): FormedSheet {
  checkSheetInput(input, options);
  const template = makeObstacle(input.template);
  const centre = placeFrame(input, template);
  const nodes = options.nodes ?? (options.preview ? PREVIEW_NODES : USUAL_NODES);
  const cells = gridCells(input.frameMm, nodes);
  const report = (from: number, to: number) => (share: number) => {
    if (options.shouldStop?.())
      throw new UnusableInput('stopped', 'forming the sheet was stopped by the caller');
    options.onProgress?.(from + share * (to - from));
    return true;
  };
  const form = (size: [number, number], onStep: (share: number) => boolean) => {
    const sheet = makeRectangle(centre, input.frameMm, size, template.highest);
    snapToPlateau(sheet, template);
    const plan = planDrape(input, template, sheet, options.preview ?? false);
    let hangingWebMm2 = 0;
    plan.onLanded = () => (hangingWebMm2 = foldedArea(measureElements(sheet, input.gaugeMm)));
    const drape = drapeAndPress(sheet, template, plan, onStep);
    return { sheet, drape, hangingWebMm2, stretches: measureElements(sheet, input.gaugeMm) };
  };
  const foot = findFoot(template);
  const halfShare = options.single ? 0 : HALF_SHARE;
  const half = options.single
    ? null
    : measureFigures(input, foot, form([cells[0] / 2, cells[1] / 2], report(0, halfShare)));
  const formed = summarise(input, template, foot, form(cells, report(halfShare, 0.95)), half);
  options.onProgress?.(1);
  return formed;
}

/** Elements along x and y: square as nearly as multiples of 8 allow, which multigrid and the half mesh need. */
export function gridCells(frameMm: readonly [number, number], nodes: number): [number, number] {
  const long = 8 * Math.max(2, Math.round(nodes / 8));
  const side = Math.max(...frameMm) / long;
  const count = (length: number) => 8 * Math.max(1, Math.round(length / side / 8));
  return [count(frameMm[0]), count(frameMm[1])];
}

interface Result {
  sheet: Membrane;
  drape: Drape;
  stretches: Stretches;
  hangingWebMm2: number;
}

function foldedArea({ area, folded }: Stretches): number {
  let sum = 0;
  for (let e = 0; e < area.length; e++) if (folded[e]) sum += area[e];
  return sum;
}

/** What both meshes are measured for. */
interface Figures {
  order: Uint32Array;
  q05Mm: number;
  part: ZoneFigures | null;
  foot: ZoneFigures | null;
}

function measureFigures({ minFormedMm }: SheetInput, foot: Foot, { sheet, stretches }: Result): Figures {
  const order = orderByThickness(stretches);
  const zone = (keep: Foot['holds']) => measureZone(sheet, stretches, order, keep, minFormedMm);
  return {
    order,
    q05Mm: areaQuantile(stretches, order, 0.05),
    part: zone((x, y, z) => !foot.holds(x, y, z)),
    foot: zone(foot.holds),
  };
}

function summarise(
  input: SheetInput,
  template: Obstacle,
  foot: Foot,
  result: Result,
  half: Figures | null,
): FormedSheet {
  const { sheet, stretches, drape, hangingWebMm2 } = result;
  const { frameMm, gaugeMm, minFormedMm } = input;
  const figures = measureFigures(input, foot, result);
  const { order, q05Mm } = figures;
  const thinnest = findThinnest(sheet, stretches, order);
  const reach = Math.max(TIGHT_MM, 2 * sheet.cell);
  const surface = drawSurface(sheet, stretches, foot);
  const placeOf = (at: Point): PlaceKind =>
    isWebNear(sheet, surface, at, DISC_MM / 2) ? 'web' : judgePlace(template, at, reach);
  const minPlace = placeOf(thinnest.at);
  const zoneOf = (name: 'part' | 'foot'): SheetZone | null => {
    const zone = figures[name];
    if (!zone || zone.minMm === Infinity) return null;
    const { at, ...rest } = zone;
    const place = placeOf(at);
    // A zone that the coarse mesh does not see at all is the fine mesh's word alone.
    const coarse = (half ?? figures)[name]?.minMm ?? Infinity;
    const meshErrorPercent = coarse === Infinity ? 100 : (100 * Math.abs(zone.minMm - coarse)) / zone.minMm;
    return { ...rest, minAt: at, place, marginPercent: marginPercent(place), meshErrorPercent };
  };
  const volume = frameMm[0] * frameMm[1] * gaugeMm;
  const volumeError = (stretches.volume - volume) / volume;
  const lost = !(Math.abs(volumeError) <= VOLUME_ALARM);
  const outcome = lost ? 'volume-lost' : drape.residual <= SETTLED ? 'converged' : 'not-settled';
  const areaWhere = (holds: (e: number) => boolean) => {
    let sum = 0;
    for (let e = 0; e < sheet.elements; e++) if (holds(e)) sum += stretches.area[e];
    return sum;
  };
  return {
    report: {
      minMm: thinnest.minMm,
      minAt: thinnest.at,
      meanMm: stretches.volume / stretches.formedArea,
      q01Mm: areaQuantile(stretches, order, 0.01),
      q05Mm,
      belowLimitAreaMm2: areaWhere((e) => stretches.thickness[e] < minFormedMm),
      webAreaMm2: foldedArea(stretches),
      unclosedAreaMm2: areaWhere((e) => surface.web[e] >= 2),
      volumeErrorPercent: 100 * volumeError,
      nodes: surface.nodes,
      steps: drape.steps,
      meshErrorPercent: (100 * Math.abs(q05Mm - (half ?? figures).q05Mm)) / q05Mm,
      marginPercent: marginPercent(minPlace),
      converged: outcome === 'converged',
      part: zoneOf('part'),
      foot: zoneOf('foot'),
      footHeightMm: foot.heightMm,
    },
    outcome,
    residual: drape.residual,
    iterations: drape.iterations,
    pressureRatio: drape.pressure,
    elementMm: [sheet.cellX, sheet.cellY],
    formedAreaMm2: stretches.formedArea,
    minPlace,
    hangingWebMm2,
    webAt: worstWeb(sheet, stretches, surface),
    surface,
    thicknessAt: makeThicknessAt(surface),
  };
}

/** Whether a folded or unsupported triangle has a corner within `reach` of a point. */
function isWebNear(
  { corners, at, elements }: Membrane,
  { web }: SheetSurface,
  point: Point,
  reach: number,
): boolean {
  for (let e = 0; e < elements; e++) {
    if (!web[e]) continue;
    for (let c = 3 * e; c < 3 * e + 3; c++) {
      const k = 3 * corners[c];
      if (Math.hypot(at[k] - point[0], at[k + 1] - point[1], at[k + 2] - point[2]) <= reach) return true;
    }
  }
  return false;
}

/** Middle of the largest triangle that is folded or lies on nothing. */
function worstWeb(
  { corners, at, elements }: Membrane,
  { area }: Stretches,
  { web }: SheetSurface,
): Point | null {
  let worst = -1;
  for (let e = 0; e < elements; e++) {
    if (web[e] && (worst < 0 || area[e] > area[worst])) worst = e;
  }
  if (worst < 0) return null;
  const middle = (axis: number) =>
    (at[3 * corners[3 * worst] + axis] + at[3 * corners[3 * worst + 1] + axis] + at[3 * corners[3 * worst + 2] + axis]) / 3; // prettier-ignore
  return [middle(0), middle(1), middle(2)];
}
