import { inRange } from './in-range';

/** What printed layers leave on a slope. Layer height and lengths in mm, draft in degrees from the vertical. */

const rad = (degrees: number) => (degrees * Math.PI) / 180;
const DEG = 180 / Math.PI;
/** Shear correction of a flat plate, and E = 3 G of an incompressible sheet. */
const SHEAR_SHARE = 5 / 6;
/** R_a of half-circles side by side over their diameter: (asin x − π/4 x) / 2 where they cross their mean height. */
const CROSSES = Math.sqrt(1 - (Math.PI / 4) ** 2);
const BEAD_RA = (Math.asin(CROSSES) - (Math.PI / 4) * CROSSES) / 2;

/** Distance from the step's corner to the true surface: layer × sin(draft). A. Dolenc, I. Mäkelä, CAD 26 (1994) 119–126. */
export function cuspMm(layerMm: number, draftDeg: number): number {
  inRange('layer (mm)', layerMm, 0);
  inRange('draft (°)', draftDeg, -90, 90, true);
  return layerMm * Math.abs(Math.sin(rad(draftDeg)));
}

/** Step in plan per layer: layer × tan(draft); Infinity on a flat top. */
export function treadMm(layerMm: number, draftDeg: number): number {
  return Math.abs(draftDeg) >= 90 ? Infinity : layerMm * Math.tan(rad(Math.abs(draftDeg)));
}

/**
 * Mean roughness R_a, µm: the saw-tooth's quarter of the cusp, but no less than the rounding of the beads, which stays on
 * a vertical wall (half-circles across a layer). Derived.
 */
export function roughnessUm(layerMm: number, draftDeg: number): number {
  const sawTooth = cuspMm(layerMm, draftDeg) / 4;
  return 1000 * Math.max(sawTooth, BEAD_RA * layerMm * Math.cos(rad(draftDeg)));
}

/** Thickest layer for a permitted cusp: min(h_max, c / sin(draft)), mm. Same source as the cusp. */
export function layerForCusp(cuspMaxMm: number, draftDeg: number, layerMaxMm: number): number {
  const sine = Math.abs(Math.sin(rad(draftDeg)));
  return sine === 0 ? layerMaxMm : Math.min(layerMaxMm, cuspMaxMm / sine);
}

/** Draft at which a nub of a depth in a groove one layer wide clears the next bead, degrees: atan(w / h). Derived. */
export function nubDraftDeg(layerMm: number, depthMm: number): number {
  return Math.atan(depthMm / layerMm) * DEG;
}

/**
 * How deep a hot sheet bulges into the groove between two beads, mm: shear over a slot of half-width h/2,
 * w ≈ p a² / (2 κ G t), G = E/3. Elastic: creep makes it more. Derived.
 */
export function bulgeMm(layerMm: number, pressureMPa: number, thicknessMm: number, hotMPa: number): number {
  inRange('sheet thickness (mm)', thicknessMm, 0);
  inRange('hot modulus (MPa)', hotMPa, 0);
  const half = layerMm / 2;
  return (pressureMPa * half * half) / (2 * SHEAR_SHARE * (hotMPa / 3) * thicknessMm);
}

/**
 * Share of a wave on the template's side that reaches the outer side of an incompressible sheet which sticks to it:
 * (cosh K + K sinh K) / (cosh² K + K²), K = 2π thickness / wavelength; plane strain, outer side free. Derived.
 */
export function shareThrough(thicknessMm: number, wavelengthMm: number): number {
  const k = (2 * Math.PI * thicknessMm) / wavelengthMm;
  if (!(k < 300)) return 0;
  return (Math.cosh(k) + k * Math.sinh(k)) / (Math.cosh(k) ** 2 + k * k);
}

/** Height of the steps on the outer side of the formed sheet, mm: the whole cusp at the tread's wavelength, a high estimate. */
export function stepThroughMm(layerMm: number, draftDeg: number, thicknessMm: number): number {
  const tread = treadMm(layerMm, draftDeg);
  return tread === 0 ? 0 : cuspMm(layerMm, draftDeg) * shareThrough(thicknessMm, tread);
}
