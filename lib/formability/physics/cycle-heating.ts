import { effusivity, type ThermalBody } from './conduction';
import { inRange } from './in-range';

/** Loss of a template's faces to still air and bed, W/m²K (8 to 15: common practice, no source; the larger is used). */
export const LOSS_WM2K = 15;

export interface Cycling {
  tool: ThermalBody;
  /** Printed wall that takes the heat up. */
  shellMm: number;
  /** Heat of one pull into the tool, J/m². */
  heatJm2: number;
  cycleS: number;
}

/** Heat that a sheet gives off while it cools from forming to demoulding, J/m², all of it into the tool (the worst case). */
export function heatOfPull(sheet: ThermalBody, gaugeMm: number, formingC: number, demouldC: number): number {
  inRange('gauge (mm)', gaugeMm, 0);
  inRange('forming over demoulding temperature (°C)', formingC, demouldC, Infinity, true);
  return sheet.densityKgM3 * sheet.heatJkgK * (gaugeMm / 1000) * (formingC - demouldC);
}

/** Rise of one lump right after pull N, K: ΔT₁ (1 − rᴺ)/(1 − r), r = e^(−P/τ), τ = ρ c b/h. */
export function lumpedRiseK({ tool, shellMm, heatJm2, cycleS }: Cycling, pull: number): number {
  inRange('printed wall (mm)', shellMm, 0);
  inRange('cycle (s)', cycleS, 0);
  const capacity = tool.densityKgM3 * tool.heatJkgK * (shellMm / 1000);
  const kept = Math.exp((-cycleS * LOSS_WM2K) / capacity);
  return ((heatJm2 / capacity) * (1 - kept ** pull)) / (1 - kept);
}

/** Rise of a half-space just before the next pull, K, nothing lost: Q″/(e√(πP)) Σ n^(−1/2). An upper bound. */
export function halfSpaceRiseK({ tool, heatJm2, cycleS }: Cycling, pull: number): number {
  inRange('cycle (s)', cycleS, 0);
  let sum = 0;
  for (let n = 1; n <= pull; n++) sum += 1 / Math.sqrt(n);
  return (heatJm2 / (effusivity(tool) * Math.sqrt(Math.PI * cycleS))) * sum;
}
