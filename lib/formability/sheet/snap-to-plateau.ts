import { measureRest, type Membrane } from './membrane';
import { heightAt, type Obstacle } from './obstacle';

/** How far below the highest point still counts as its plateau, in cells of the sheet. */
const DEPTH = 0.02;
const HALVINGS = 30;

/**
 * Moves nodes of the flat sheet, by half a cell at most and along grid lines, onto the rim of the highest plateau.
 * The sheet sticks there from the start, and all that lies beyond the rim is free to stretch; without this up to a
 * whole element over the edge would be too, and walls come out too thick by about half a cell over the gap.
 * @param sheet as made: level, at rest
 */
export function snapToPlateau(sheet: Membrane, template: Obstacle): void {
  const { nx, ny, nodes, restX, restY } = sheet;
  const level = template.highest - DEPTH * sheet.cell;
  const inside = new Uint8Array(nodes);
  for (let n = 0; n < nodes; n++) inside[n] = heightAt(template, restX[n], restY[n]) >= level ? 1 : 0;
  const moveTo = new Float64Array(2 * nodes);
  const moved = new Float64Array(nodes).fill(Infinity);
  const consider = (a: number, b: number) => {
    if (inside[a] === inside[b]) return;
    const [from, to] = inside[a] ? [a, b] : [b, a];
    const share = rimBetween(sheet, template, level, from, to);
    const node = share < 0.5 ? from : to;
    if (!sheet.free[node]) return;
    const x = restX[from] + share * (restX[to] - restX[from]);
    const y = restY[from] + share * (restY[to] - restY[from]);
    const far =
      Math.min(share, 1 - share) * Math.sqrt((restX[to] - restX[from]) ** 2 + (restY[to] - restY[from]) ** 2);
    if (far >= moved[node]) return;
    moved[node] = far;
    moveTo[2 * node] = x;
    moveTo[2 * node + 1] = y;
  };
  for (let j = 0, n = 0; j <= ny; j++) {
    for (let i = 0; i <= nx; i++, n++) {
      if (i < nx) consider(n, n + 1);
      if (j < ny) consider(n, n + nx + 1);
    }
  }
  for (let n = 0; n < nodes; n++) {
    if (moved[n] === Infinity) continue;
    sheet.at[3 * n] = restX[n] = moveTo[2 * n];
    sheet.at[3 * n + 1] = restY[n] = moveTo[2 * n + 1];
  }
  measureRest(sheet);
}

/** Share of the way from a node on the plateau to one beside it at which the rim lies; just on the plateau. */
function rimBetween(sheet: Membrane, template: Obstacle, level: number, from: number, to: number): number {
  const { restX, restY } = sheet;
  let on = 0;
  let off = 1;
  for (let k = 0; k < HALVINGS; k++) {
    const middle = (on + off) / 2;
    const x = restX[from] + middle * (restX[to] - restX[from]);
    const y = restY[from] + middle * (restY[to] - restY[from]);
    if (heightAt(template, x, y) >= level) on = middle;
    else off = middle;
  }
  return on;
}
