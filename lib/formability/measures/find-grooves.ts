import { centreX, centreY, type Grid } from '../dexel/grid';
import type { Mesh } from '../mesh/mesh';
import type { Spacing } from '../report';
import type { FacetGrid } from './facet-grid';
import type { Pit } from './find-pits';
import { measureGap } from './measure-gap';

/** A pit at least so many times longer than it is wide is a groove between two walls; a rounder one is a hole. */
const LONG = 3;
/** Cuts are made so far above the floor and below the top, mm. */
const CUT_MM = 0.01;
const REACH_CELLS = 6;
const REACH_MM = 1.5;
const MOST_GROOVES = 60;
/** The deepest pits are looked at; more are a rough surface. */
const MOST_PITS = 300;
/** Nearer than this, mm, walls touch. */
const TOUCH_MM = 1e-3;

/**
 * Straight grooves that are closed at both ends: no two bodies stand apart there, but the sheet bridges between their
 * long sides all the same. Looked at across the middle, at the floor and at the level where they overflow.
 * @param least height of walls that count, mm
 */
export function findGrooves(
  mesh: Mesh,
  facets: FacetGrid,
  surface: Float64Array,
  grid: Grid,
  pits: readonly Pit[],
  least: number,
): Spacing[] {
  const found: Spacing[] = [];
  const depth = (pit: Pit) => pit.spill - surface[pit.floor];
  const deep = pits
    .filter((pit) => pit.members.length > 0 && depth(pit) >= least)
    .sort((a, b) => depth(b) - depth(a) || a.floor - b.floor);
  for (const pit of deep.slice(0, MOST_PITS)) {
    const floor = surface[pit.floor];
    const heightMm = depth(pit);
    const shape = shapeOf(pit.members, grid);
    if (!(shape.length >= LONG * shape.width)) continue;
    const half = shape.width / 2;
    const [x, y] = shape.middle;
    const [ux, uy] = shape.across;
    const p: [number, number] = [x - half * ux, y - half * uy];
    const q: [number, number] = [x + half * ux, y + half * uy];
    const reach = REACH_CELLS * grid.cell + REACH_MM;
    const low = measureGap(mesh, facets, floor + CUT_MM, p, q, reach);
    const high = measureGap(mesh, facets, pit.spill - CUT_MM, p, q, reach);
    if (!low || !high || low.gap < TOUCH_MM) continue;
    found.push({
      gapMm: Math.max(high.gap, low.gap),
      gapAtBedMm: low.gap,
      heightMm,
      heightOverGap: heightMm / low.gap,
      between: [
        [high.from[0], high.from[1], pit.spill],
        [high.to[0], high.to[1], pit.spill],
      ],
    });
  }
  return found.sort((a, b) => b.heightOverGap - a.heightOverGap).slice(0, MOST_GROOVES);
}

/** Sides of the rectangle with the same second moments as the cells, its middle, and the direction across it. */
function shapeOf(
  members: readonly number[],
  grid: Grid,
): { length: number; width: number; middle: [number, number]; across: [number, number] } {
  let [mx, my] = [0, 0];
  for (const c of members) {
    mx += centreX(grid, c) / members.length;
    my += centreY(grid, c) / members.length;
  }
  // A cell is a square itself: its own moment is a twelfth of its side squared.
  let [xx, xy, yy] = [grid.cell ** 2 / 12, 0, grid.cell ** 2 / 12];
  for (const c of members) {
    const [x, y] = [centreX(grid, c) - mx, centreY(grid, c) - my];
    xx += (x * x) / members.length;
    xy += (x * y) / members.length;
    yy += (y * y) / members.length;
  }
  const half = (xx + yy) / 2;
  const apart = Math.hypot((xx - yy) / 2, xy);
  const angle = Math.atan2(2 * xy, xx - yy) / 2;
  return {
    length: Math.sqrt(12 * (half + apart)),
    width: Math.sqrt(12 * Math.max(half - apart, 0)),
    middle: [mx, my],
    across: [-Math.sin(angle), Math.cos(angle)],
  };
}
