import { inRange } from './in-range';

/** Dry air at room temperature (usual values). */
export const AIR = { gasJkgK: 287.05, gamma: 1.4, viscosityPaS: 1.82e-5 };
/** Standard atmosphere, Pa. */
export const ATMOSPHERE_PA = 101_325;

/** Downstream over upstream pressure below which an orifice is choked: (2/(γ+1))^(γ/(γ−1)) = 0.5283. */
export const CRITICAL_RATIO = (2 / (AIR.gamma + 1)) ** (AIR.gamma / (AIR.gamma - 1));

/** ψ(r) of an isentropic orifice; C* = 0.68473 when choked (ISO 9300 form q_m = A C_d C* p₀ / √(R T₀)). */
export function flowFunction(ratio: number): number {
  const { gamma: g } = AIR;
  const r = Math.min(1, Math.max(CRITICAL_RATIO, ratio));
  return Math.sqrt(Math.max(0, ((2 * g) / (g - 1)) * (r ** (2 / g) - r ** ((g + 1) / g))));
}

export interface Flow {
  kgS: number;
  regime: 'choked' | 'subcritical' | 'laminar';
}

export interface Bore {
  diameterMm: number;
  lengthMm: number;
}

export interface Pressures {
  upstreamPa: number;
  downstreamPa: number;
  kelvin: number;
}

/** Air flows down: @throws RangeError where it would not, or is no warmer than nothing. */
function checked(at: Pressures): Pressures {
  inRange('upstream pressure (Pa)', at.upstreamPa, 0);
  inRange('downstream pressure (Pa)', at.downstreamPa, 0, at.upstreamPa, true);
  inRange('temperature (K)', at.kelvin, 0);
  return at;
}

/** Mass flow through a sharp hole, kg/s. */
export function orificeFlow(areaMm2: number, discharge: number, at: Pressures): number {
  const { upstreamPa, downstreamPa, kelvin } = checked(at);
  inRange('area (mm²)', areaMm2, 0, Infinity, true);
  inRange('discharge', discharge, 0, 1);
  const psi = flowFunction(downstreamPa / upstreamPa);
  return (discharge * areaMm2 * 1e-6 * upstreamPa * psi) / Math.sqrt(AIR.gasJkgK * kelvin);
}

/** Isothermal laminar mass flow of a gas through a long bore, kg/s: π d⁴ (p₁² − p₂²) / (256 μ L R T). */
export function laminarFlow({ diameterMm, lengthMm }: Bore, at: Pressures): number {
  const { upstreamPa, downstreamPa, kelvin } = checked(at);
  inRange('bore (mm)', diameterMm, 0);
  const d = diameterMm / 1000;
  const length = lengthMm / 1000;
  if (length <= 0) return Infinity;
  return (
    (Math.PI * d ** 4 * (upstreamPa ** 2 - downstreamPa ** 2)) /
    (256 * AIR.viscosityPaS * length * AIR.gasJkgK * kelvin)
  );
}

/** Flow through a bore: the smaller of orifice and laminar rules. */
export function boreFlow(bore: Bore, discharge: number, at: Pressures): Flow {
  const orifice = orificeFlow((Math.PI / 4) * bore.diameterMm ** 2, discharge, at);
  const laminar = laminarFlow(bore, at);
  if (laminar < orifice) return { kgS: laminar, regime: 'laminar' };
  return {
    kgS: orifice,
    regime: at.downstreamPa / at.upstreamPa < CRITICAL_RATIO ? 'choked' : 'subcritical',
  };
}

/** Time to drive a volume out at constant pressure and temperature, s; choked, it is V / (C_d A C* √(R T)). */
export function expelTimeS(volumeMm3: number, kgS: number, at: Pressures): number {
  return (volumeMm3 * 1e-9 * at.upstreamPa) / (AIR.gasJkgK * at.kelvin) / kgS;
}

/** Simpson's rule over the subcritical part of a fall. */
const FALL_STEPS = 64;

/**
 * Time for the air in a fixed volume to fall from one pressure to another against a third, s, at constant temperature
 * through holes: choked, it is τ ln(p₁/p₂) with τ = V / (C_d A C* √(R T)); below the critical ratio integrated.
 * @param areaMm2 of all holes together
 * @throws RangeError where the pressure cannot fall so far
 */
export function evacuationS(
  volumeMm3: number,
  areaMm2: number,
  discharge: number,
  { fromPa, toPa, againstPa, kelvin }: { fromPa: number; toPa: number; againstPa: number; kelvin: number },
): number {
  if (!(fromPa >= toPa && toPa > againstPa && againstPa >= 0))
    throw new RangeError(
      `pressure falls from ${fromPa} to ${toPa} Pa against ${againstPa} Pa: each must be above the next`,
    );
  const speed = Math.sqrt(AIR.gasJkgK * kelvin);
  const tau = (volumeMm3 * 1e-9) / (discharge * areaMm2 * 1e-6 * speed);
  const chokedTo = Math.min(fromPa, Math.max(toPa, againstPa / CRITICAL_RATIO));
  const choked = Math.log(fromPa / chokedTo) / flowFunction(0);
  if (chokedTo <= toPa) return tau * choked;
  // dt = −τ dp / (p ψ); in u = √(1 − against/p), since ψ rises like that root from nothing.
  const root = (pa: number) => Math.sqrt(1 - againstPa / pa);
  const [from, to] = [root(toPa), root(chokedTo)];
  const step = (to - from) / FALL_STEPS;
  let sum = 0;
  for (let k = 0; k <= FALL_STEPS; k++) {
    const u = from + k * step;
    const ratio = 1 - u * u;
    // dp / p = 2 u du / (1 − u²).
    const slope = (2 * u) / (ratio * flowFunction(ratio));
    sum += slope * (k === 0 || k === FALL_STEPS ? 1 : k & 1 ? 4 : 2);
  }
  return tau * (choked + (sum * step) / 3);
}
