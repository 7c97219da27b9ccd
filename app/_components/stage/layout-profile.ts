import { outerSide, type SheetRun } from '@/lib/stage-model/cut-sheet';
import type { Section, SectionPoint } from '@/lib/stage-model/section';
import type { SectionWall } from '@/lib/stage-model/find-section-walls';

export interface ProfileFrame {
  /** what the drawing must hold, mm: along the cut and upwards from the bed */
  from: number;
  to: number;
  high: number;
  widthPx: number;
}

export interface ProfileScale {
  pxPerMm: number;
  x(alongMm: number): number;
  y(heightMm: number): number;
  heightPx: number;
  bedY: number;
}

const SIDE = 34;
const TOP = 46;
const FOOT = 54;
/** The drawing is never enlarged so far that a low tray would fill the page. */
const MOST_BODY_PX = 190;

/** One scale for both axes, as in a drawing; the template stands in the middle of the width. */
export function scaleProfile({ from, to, high, widthPx }: ProfileFrame): ProfileScale {
  const along = Math.max(to - from, 1e-6);
  const pxPerMm = Math.min((widthPx - 2 * SIDE) / along, MOST_BODY_PX / Math.max(high, 1e-6));
  const left = (widthPx - along * pxPerMm) / 2;
  const bedY = TOP + high * pxPerMm;
  return {
    pxPerMm,
    x: (u) => left + (u - from) * pxPerMm,
    y: (z) => bedY - z * pxPerMm,
    heightPx: bedY + FOOT,
    bedY,
  };
}

/** All outlines as one SVG path; solid is on one hand all along, so the nonzero rule leaves voids open. */
export function profilePath(section: Section, scale: ProfileScale): string {
  return section.loops
    .map(({ segments, closed }) => {
      const points = [segments[0].from, ...segments.map((s) => s.to)];
      if (closed) points.pop();
      return `M${points.map((p) => toText(p, scale)).join('L')}${closed ? 'Z' : ''}`;
    })
    .join('');
}

/** The sheet's band along the cut: its template side there, its outer side back. */
export function sheetPath(run: SheetRun, times: number, scale: ProfileScale): string {
  const back = outerSide(run, times).reverse();
  return `M${[...run.points, ...back].map((p) => toText(p, scale)).join('L')}Z`;
}

/** The outer side wherever the sheet is thinner than wanted. */
export function thinSheetPath(run: SheetRun, times: number, wantedMm: number, scale: ProfileScale): string {
  const outer = outerSide(run, times);
  return outer
    .slice(1)
    .map((to, i) =>
      (run.thicknessMm[i] + run.thicknessMm[i + 1]) / 2 < wantedMm
        ? `M${toText(outer[i], scale)}L${toText(to, scale)}`
        : '',
    )
    .join('');
}

function toText([u, z]: SectionPoint, scale: ProfileScale): string {
  return `${scale.x(u).toFixed(2)} ${scale.y(z).toFixed(2)}`;
}

export interface WallLabel {
  wall: SectionWall;
  text: string;
  broken: boolean;
  /** foot of the leader on the wall, then the line that the words stand on */
  foot: [number, number];
  elbow: [number, number];
  end: number;
}

const CHARACTER_PX = 6.9;
const LANES = [18, 38];
const GAP = 10;

/** A bore to the bed up to this wide is a vent (the engine's definition); its walls are upright by nature. */
const VENT_MM = 3;
const UPRIGHT_DEG = 1;

/**
 * Walls worth a figure: those that stand at least a tenth of the template's height, tallest first. The two sides of a
 * vent are not walls that the sheet is drawn off.
 */
export function mainWalls(walls: readonly SectionWall[], high: number): SectionWall[] {
  const rise = (wall: SectionWall) => Math.abs(wall.to[1] - wall.from[1]);
  const upright = walls.filter((wall) => Math.abs(wall.draftDeg) <= UPRIGHT_DEG);
  // Solid is on the left of each side, so the two sides of a bore run in opposite senses, the rising one first.
  const isBore = (wall: SectionWall) =>
    Math.abs(wall.draftDeg) <= UPRIGHT_DEG &&
    upright.some((other) => {
      const gap = wall.to[1] > wall.from[1] ? other.from[0] - wall.from[0] : wall.from[0] - other.from[0];
      const opposite = other.to[1] > other.from[1] !== wall.to[1] > wall.from[1];
      return opposite && gap > 0 && gap <= VENT_MM;
    });
  return walls
    .filter(
      (wall) =>
        (wall.kind === 'wall' || wall.kind === 'underside') && rise(wall) >= high * 0.1 && !isBore(wall),
    )
    .sort((a, b) => rise(b) - rise(a));
}

/**
 * Draft figures over the drawing: every wall below the limit that finds room, and each other value once (like walls of
 * one draft are told by one of them).
 */
export function layoutWallLabels(
  walls: readonly SectionWall[],
  limitDeg: number,
  scale: ProfileScale,
  widthPx: number,
): WallLabel[] {
  const broken = walls.filter((w) => w.draftDeg < limitDeg);
  const others = walls.filter((w) => w.draftDeg >= limitDeg);
  const told = new Set<string>();
  const placed: WallLabel[] = [];
  for (const wall of [...broken, ...others]) {
    const isBroken = wall.draftDeg < limitDeg;
    const value = wall.draftDeg
      .toFixed(1)
      .replace('-', '\u2212')
      .replace(/^\u22120\.0$/, '0.0');
    if (!isBroken && told.has(value)) continue;
    const label = place(wall, `draft ${value}°`, isBroken, scale, widthPx, placed);
    if (!label) continue;
    told.add(value);
    placed.push(label);
  }
  return placed;
}

function place(
  wall: SectionWall,
  text: string,
  broken: boolean,
  scale: ProfileScale,
  widthPx: number,
  placed: readonly WallLabel[],
): WallLabel | null {
  // The leader stands high on the wall, where it crosses least of the drawing.
  const [low, top] = wall.from[1] < wall.to[1] ? [wall.from, wall.to] : [wall.to, wall.from];
  const foot: [number, number] = [
    scale.x(low[0] + (top[0] - low[0]) * 0.7),
    scale.y(low[1] + (top[1] - low[1]) * 0.7),
  ];
  const length = text.length * CHARACTER_PX;
  for (const laneY of LANES) {
    for (const [dx, toLeft] of [
      [14, false],
      [-14, true],
      [34, false],
      [-34, true],
    ] as const) {
      const start = foot[0] + dx;
      const end = toLeft ? start - length : start + length;
      const [a, b] = [Math.min(start, end), Math.max(start, end)];
      if (a < 4 || b > widthPx - 4) continue;
      const free = placed.every((other) => {
        const [c, d] = [Math.min(other.elbow[0], other.end), Math.max(other.elbow[0], other.end)];
        const apart = b + GAP < c || d + GAP < a;
        // A leader that comes down through words of the lower lane would strike them out.
        const clear =
          other.elbow[1] > laneY
            ? start < c - 4 || start > d + 4
            : other.elbow[0] < a - 4 || other.elbow[0] > b + 4;
        return other.elbow[1] === laneY ? apart : clear || apart;
      });
      if (free) return { wall, text, broken, foot, elbow: [start, laneY], end };
    }
  }
  return null;
}

/** A round length near a sixth of the drawing's width: 1, 2 or 5 times a power of ten, mm. */
export function scaleBarMm(pxPerMm: number, widthPx: number): number {
  const wanted = widthPx / 6 / pxPerMm;
  const power = 10 ** Math.floor(Math.log10(wanted));
  const step = wanted / power;
  return power * (step >= 5 ? 5 : step >= 2 ? 2 : 1);
}
