import { heightAt, meetAt, type Obstacle } from './obstacle';
import { stick, type Run } from './relax';

/** How far a node is pushed, in cells of the sheet: the fillet that the greatest pressure leaves is about that round. */
const REACH = 3;
const TRIES_PER_CELL = 8;

/**
 * Pushes nodes that pressure has left free, along the sheet's normal, onto what lies within three cells. All normals
 * are taken before the first node moves, so the order of nodes does not matter. The rest stays free: web.
 */
export function closeLeftovers(run: Run, template: Obstacle): void {
  const { sheet } = run;
  const { at } = sheet;
  const normal = nodeNormals(run);
  const step = sheet.cell / TRIES_PER_CELL;
  for (let n = 0; n < sheet.nodes; n++) {
    if (!sheet.free[n]) continue;
    const k = 3 * n;
    const length = Math.sqrt(normal[k] ** 2 + normal[k + 1] ** 2 + normal[k + 2] ** 2);
    if (!(length > 0)) continue;
    const dx = (-step * normal[k]) / length;
    const dy = (-step * normal[k + 1]) / length;
    const dz = (-step * normal[k + 2]) / length;
    for (let s = 0; s < REACH * TRIES_PER_CELL; s++) {
      const x = at[k] + s * dx;
      const y = at[k + 1] + s * dy;
      const z = at[k + 2] + s * dz;
      if (z + dz > heightAt(template, x + dx, y + dy)) continue;
      const share = s + meetAt(template, x, y, z, dx, dy, dz);
      at[k] += share * dx;
      at[k + 1] += share * dy;
      at[k + 2] += share * dz;
      stick(run, n);
      break;
    }
  }
}

/** Upward normals at nodes, weighted by area. */
function nodeNormals({ sheet, active, activeCount }: Run): Float64Array {
  const { at, corners, nodes } = sheet;
  const normal = new Float64Array(3 * nodes);
  for (let a = 0; a < activeCount; a++) {
    const e = 3 * active[a];
    const p = 3 * corners[e];
    const q = 3 * corners[e + 1];
    const r = 3 * corners[e + 2];
    const ux = at[q] - at[p];
    const uy = at[q + 1] - at[p + 1];
    const uz = at[q + 2] - at[p + 2];
    const vx = at[r] - at[p];
    const vy = at[r + 1] - at[p + 1];
    const vz = at[r + 2] - at[p + 2];
    const nx = uy * vz - uz * vy;
    const ny = uz * vx - ux * vz;
    const nz = ux * vy - uy * vx;
    for (let c = 0; c < 3; c++) {
      const k = 3 * corners[e + c];
      normal[k] += nx;
      normal[k + 1] += ny;
      normal[k + 2] += nz;
    }
  }
  return normal;
}
