import { erfc } from './erf';
import { inRange } from './in-range';

/** A body that heat flows into: conductivity W/mK, density kg/m³, heat capacity J/kgK. */
export interface ThermalBody {
  conductivityWmK: number;
  densityKgM3: number;
  heatJkgK: number;
}

/** √(kρc), W√s/m²K. */
export function effusivity({ conductivityWmK: k, densityKgM3: rho, heatJkgK: c }: ThermalBody): number {
  inRange('conductivity (W/mK)', k, 0);
  inRange('density (kg/m³)', rho, 0);
  inRange('heat capacity (J/kgK)', c, 0);
  return Math.sqrt(k * rho * c);
}

/** k/(ρc), m²/s. */
export function diffusivity({ conductivityWmK: k, densityKgM3: rho, heatJkgK: c }: ThermalBody): number {
  return k / (rho * c);
}

/**
 * Temperature between two bodies that touch, both thick enough for the time looked at.
 * Source: F. Incropera, D. DeWitt, Fundamentals of Heat and Mass Transfer, contact of two semi-infinite solids.
 */
export function contactC(sheet: ThermalBody, sheetC: number, tool: ThermalBody, toolC: number): number {
  const [s, t] = [effusivity(sheet), effusivity(tool)];
  return (s * sheetC + t * toolC) / (s + t);
}

export interface FiniteSheet {
  sheet: ThermalBody;
  tool: ThermalBody;
  /** Of the sheet, whose free side is insulated. */
  thicknessMm: number;
  sheetC: number;
  toolC: number;
}

/**
 * Temperature at the interface (depth 0) or below it in the tool, `timeS` after a sheet of finite thickness is laid on a
 * thick tool: the exact image series (Laplace transform; H. S. Carslaw, J. C. Jaeger, Conduction of Heat in Solids).
 */
export function toolC(contact: FiniteSheet, timeS: number, depthMm = 0): number {
  const { sheet, tool, thicknessMm, sheetC, toolC: start } = contact;
  inRange('sheet thickness (mm)', thicknessMm, 0);
  inRange('depth (mm)', depthMm, 0, Infinity, true);
  if (timeS <= 0) return start;
  const [es, et] = [effusivity(sheet), effusivity(tool)];
  const reflected = (es - et) / (es + et);
  const across = thicknessMm / 1000 / Math.sqrt(diffusivity(sheet));
  const down = depthMm / 1000 / Math.sqrt(diffusivity(tool));
  const root = 2 * Math.sqrt(timeS);
  let images = 0;
  let weight = 1;
  for (let n = 1; n < 10_000; n++) {
    const term = weight * erfc((2 * n * across + down) / root);
    images += term;
    weight *= reflected;
    if (Math.abs(term) < 1e-16) break;
  }
  return start + (sheetC - start) * (es / (es + et)) * (erfc(down / root) - (1 - reflected) * images);
}

/**
 * Time until the free side of a sheet on a cold tool, whose surface stays as cold, has fallen to `demouldC`, s; one term of
 * the series, good from Fourier number 0.1 on. @throws RangeError where the tool is not colder than the sheet must become.
 */
export function coolingTimeS(
  sheet: ThermalBody,
  thicknessMm: number,
  at: { sheetC: number; toolC: number; demouldC: number },
): number {
  if (!(at.toolC < at.demouldC))
    throw new RangeError('a tool that is not colder than the sheet at demoulding does not cool it');
  if (!(at.sheetC > at.demouldC)) return 0;
  inRange('sheet thickness (mm)', thicknessMm, 0);
  const length = thicknessMm / 1000;
  const ratio = ((4 / Math.PI) * (at.sheetC - at.toolC)) / (at.demouldC - at.toolC);
  return ((4 * length * length) / (Math.PI ** 2 * diffusivity(sheet))) * Math.log(ratio);
}
