import type { Facets } from './mesh/measure-facets';
import type { Mesh } from './mesh/mesh';
import { SIN_VERTICAL } from './measures/thresholds';
import type { Visibility } from './measures/visibility';

export const FLAG_BED = 1;
export const FLAG_UNDERCUT = 2;
export const FLAG_UNVENTED = 4;

/** 9 per facet, oriented, in the file's frame in x and y, standing on the bed. */
export function facetPositions(mesh: Mesh): Float32Array {
  const { index, position, centre } = mesh;
  const out = new Float32Array(index.length * 3);
  for (let c = 0, o = 0; c < index.length; c++, o += 3) {
    const v = index[c] * 3;
    out[o] = position[v] + centre[0];
    out[o + 1] = position[v + 1] + centre[1];
    out[o + 2] = position[v + 2];
  }
  return out;
}

/**
 * Bit 0: on the bed. Bit 1: overhangs over connected air, or lies mostly in the shadow of the part. Bit 2: looks into
 * a pocket that no vent leads out of.
 */
export function facetFlags(facets: Facets, visibility: Visibility, unvented: Uint8Array): Uint8Array {
  const flags = new Uint8Array(facets.area.length);
  for (let t = 0; t < flags.length; t++) {
    if (facets.bed[t]) flags[t] = FLAG_BED;
    else if (facets.nz[t] < -SIN_VERTICAL) {
      if (visibility.visible[t] + visibility.shadowed[t] > 0.5) flags[t] = FLAG_UNDERCUT;
    } else if (visibility.shadowed[t] > 0.5) flags[t] = FLAG_UNDERCUT;
    if (unvented[t]) flags[t] |= FLAG_UNVENTED;
  }
  return flags;
}

/** Areas of the undercut section: overhang faces connected air; everything shadowed, overhang included. */
export function undercutAreas(
  facets: Facets,
  visibility: Visibility,
  bore: Uint8Array,
): { overhangAreaMm2: number; shadowedAreaMm2: number } {
  let overhang = 0;
  let shadowed = 0;
  const { area, nz, bed } = facets;
  const { visible, shadowed: hidden } = visibility;
  for (let t = 0; t < area.length; t++) {
    if (bed[t]) continue;
    if (nz[t] < -SIN_VERTICAL) {
      const open = area[t] * (visible[t] + hidden[t]);
      overhang += open;
      shadowed += open;
    } else if (!bore[t]) {
      shadowed += area[t] * hidden[t];
    }
  }
  return { overhangAreaMm2: overhang, shadowedAreaMm2: shadowed };
}
