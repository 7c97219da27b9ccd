import type { FilamentMaterial } from '../materials/filaments';
import { inRange } from './in-range';

/** ISO 75-2 end point: flexural strain 6 h Δs / L² = 6 · 4 · 0.34 / 64² (4 mm bar flatwise, 64 mm span). */
const ENDPOINT_STRAIN = (6 * 4 * 0.34) / 64 ** 2;
/** Stress of method A and B, MPa. */
const AT_HDT_A = 1.8 / ENDPOINT_STRAIN;
const AT_HDT_B = 0.45 / ENDPOINT_STRAIN;
/** Below this modulus, MPa, nothing holds. */
const FAILED = 1;
const GLASSY_SLOPE = 0.004;
const HALF = 0.5;

/**
 * Short-time modulus of a printed polymer at a temperature, MPa: glassy line to 10 K below HDT A, log-linear through the
 * two points that ISO 75 defines, then a decade per 10 K. Derived; it holds the test's own creep, so it lies below a
 * dynamic curve. Filled grades whose HDT A lies above their glass transition halve over that and keep a plateau.
 * Measured data come first where a studio has them.
 */
export function modulusAt(material: FilamentMaterial, celsius: number): number {
  inRange('temperature (°C)', celsius, -273.15, Infinity, true);
  const e23 = material.modulusMPa.value;
  const a = material.hdtAC.value;
  const b = material.hdtBC.value;
  const knee = a - 10;
  if (celsius <= knee) return e23 * glassy(material, celsius);
  if (celsius <= a) return logLine(celsius, knee, e23 * glassy(material, knee), a, AT_HDT_A);
  if (celsius <= b) return logLine(celsius, a, AT_HDT_A, b, AT_HDT_B);
  return Math.max(FAILED, AT_HDT_B * 10 ** (-(celsius - b) / 10));
}

function glassy(material: FilamentMaterial, celsius: number): number {
  const tg = material.glassC.value;
  if (!material.filled || !material.semiCrystalline || material.hdtAC.value <= tg)
    return Math.max(HALF, 1 - GLASSY_SLOPE * (celsius - 23));
  const start = tg - 10;
  const atStart = Math.max(HALF, 1 - GLASSY_SLOPE * (Math.min(celsius, start) - 23));
  const share = Math.min(1, Math.max(0, (celsius - start) / 20));
  return atStart + (HALF - atStart) * share;
}

function logLine(x: number, x0: number, y0: number, x1: number, y1: number): number {
  if (x1 <= x0) return y1;
  return y0 * (y1 / y0) ** ((x - x0) / (x1 - x0));
}
