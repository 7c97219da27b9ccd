import type { Air } from '../dexel/air';
import type { Columns } from '../dexel/columns';
import type { Facets } from '../mesh/measure-facets';
import type { Mesh } from '../mesh/mesh';
import type { Visibility } from './visibility';

export interface ShadowInput {
  mesh: Mesh;
  facets: Facets;
  columns: Columns;
  air: Air;
  visibility: Visibility;
  unionVolumeMm3: number;
  /** Closed, standing on or over the bed, nothing covered twice: only then do the facets tell the envelope. */
  sound: boolean;
  /** Air below ledges between the grid's columns, where those saw none. */
  unseenMm3: number;
}

/** A facet seen by this share or more is seen whole; by the rest of 1 or less, not at all. */
const WHOLE = 0.999;
/** How far along every jump of H, in cells, the grid may be off and the facets still be believed. */
const BELIEVED = 0.75;

/**
 * Volumes of the air below the part's own cover. Shadow = ∫ H dA − union volume. The grid has every silhouette wrong by
 * up to half a cell, which for a thin wedge below a leaning wall is several per cent of it; so ∫ H is summed as prisms
 * below the facets that are seen whole, and from cells only below the rest. The grid's parts keep their ratio.
 * @returns mm³
 */
export function measureShadow(input: ShadowInput): { undercut: number; enclosed: number } {
  const { undercutVolume, enclosedVolume } = input.air;
  const counted = undercutVolume + enclosedVolume;
  if (counted === 0) return { undercut: input.unseenMm3, enclosed: 0 };
  if (!input.sound) return { undercut: undercutVolume, enclosed: enclosedVolume };
  const shadow = envelopeVolume(input) - input.unionVolumeMm3;
  const doubt = BELIEVED * input.columns.grid.cell * jumpArea(input.columns);
  const ratio = shadow > 0 && Math.abs(shadow - counted) <= doubt ? shadow / counted : 1;
  return { undercut: undercutVolume * ratio, enclosed: enclosedVolume * ratio };
}

function envelopeVolume({ mesh, facets, columns, visibility }: ShadowInput): number {
  const { index, position: p } = mesh;
  const { visible, shadowed, enclosed } = visibility;
  const { area, nz } = facets;
  const { start, count, facet, height } = columns;
  const whole = new Uint8Array(mesh.triangles);
  let volume = 0;
  for (let t = 0; t < whole.length; t++) {
    if (!(visible[t] / (visible[t] + shadowed[t] + enclosed[t]) >= WHOLE)) continue;
    whole[t] = 1;
    if (nz[t] <= 0) continue;
    const z = p[index[3 * t] * 3 + 2] + p[index[3 * t + 1] * 3 + 2] + p[index[3 * t + 2] * 3 + 2];
    volume += (area[t] * nz[t] * z) / 3;
  }
  const cellArea = columns.grid.cell ** 2;
  for (let c = 0; c < count.length; c++) {
    if (count[c] === 0) continue;
    const top = facet[start[c] + 2 * count[c] - 1];
    if (top < 0 || whole[top] === 0) volume += height[c] * cellArea;
  }
  return volume;
}

/** Area of the steps of H from cell to cell. */
function jumpArea({ grid: { nx, cell }, height }: Columns): number {
  let sum = 0;
  for (let c = 0; c < height.length; c++) {
    const besideX = (c + 1) % nx === 0 ? 0 : height[c + 1];
    const besideY = c + nx < height.length ? height[c + nx] : 0;
    sum += Math.abs(height[c] - besideX) + Math.abs(height[c] - besideY);
  }
  return sum * cell;
}
