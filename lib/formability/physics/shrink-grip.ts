import { inRange } from './in-range';

/**
 * A formed part shrinks onto the template. Thin ring on a rigid core (Lamé) with Coulomb's friction; derived, the same form
 * is used for ejection from injection moulds. Valid for a wall thin against its radius, and no vacuum below the part.
 */
export interface Shrunk {
  /** Modulus of the set sheet, MPa. */
  modulusMPa: number;
  /** Linear shrinkage after it sets, share of 1. */
  shrinkage: number;
  wallMm: number;
}

/** Pressure of a shrunk ring of a radius on its core, MPa: E ε t / R. */
export function gripMPa({ modulusMPa, shrinkage, wallMm }: Shrunk, radiusMm: number): number {
  inRange('radius (mm)', radiusMm, 0);
  inRange('shrinkage', shrinkage, 0, 1, true);
  return (modulusMPa * shrinkage * wallMm) / radiusMm;
}

/** Draft from which the part comes off by itself, degrees: tan δ = μ. */
export function selfReleaseDeg(friction: number): number {
  inRange('friction', friction, 0, Infinity, true);
  return (Math.atan(friction) * 180) / Math.PI;
}

/**
 * Force to draw a closed wall off along the pull, N: p A (μ cos δ − sin δ) with p A = 2π E ε t H whatever the outline's
 * radius; 0 where it releases by itself.
 */
export function releaseForceN(part: Shrunk, heightMm: number, draftDeg: number, friction: number): number {
  const draft = (draftDeg * Math.PI) / 180;
  const hold = 2 * Math.PI * heightMm * gripMPa(part, 1);
  return Math.max(0, hold * (friction * Math.cos(draft) - Math.sin(draft)));
}
