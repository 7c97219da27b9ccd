import { describe, expect, it } from 'vitest';
import {
  AIR,
  ATMOSPHERE_PA,
  boreFlow,
  CRITICAL_RATIO,
  evacuationS,
  expelTimeS,
  flowFunction,
  laminarFlow,
  orificeFlow,
} from '@/lib/formability/physics/gas-flow';

const room = { upstreamPa: 101_325, downstreamPa: 0, kelvin: 293.15 };
const circle = (d: number) => (Math.PI / 4) * d * d;

describe('gas flow: standard gas dynamics, form of ISO 9300; Hagen and Poiseuille', () => {
  it('critical ratio and flow functions (A1, A2, A11)', () => {
    expect(CRITICAL_RATIO).toBeCloseTo(0.5282818, 7);
    expect(flowFunction(0.1)).toBeCloseTo(0.6847315, 7);
    expect(flowFunction(0.9)).toBeCloseTo(0.4225809, 7);
    expect(flowFunction(0.8)).toBeCloseTo(0.560661, 7);
    expect(flowFunction(0.6)).toBeCloseTo(0.6769153, 7);
    expect(flowFunction(1)).toBe(0);
  });

  it('orifices (A3, A4)', () => {
    expect(orificeFlow(circle(1), 1, room)).toBeCloseTo(1.878465e-4, 9);
    expect(orificeFlow(circle(0.5), 0.6, room)).toBeCloseTo(2.817697e-5, 9);
    expect(orificeFlow(circle(1), 1, { ...room, downstreamPa: 0.8 * 101_325 })).toBeCloseTo(1.538095e-4, 9);
  });

  it('long bores are laminar, wide ones are not (A8), with a Reynolds number of 4 ṁ / π d μ (A9)', () => {
    const at = { ...room, downstreamPa: 20_000 };
    const flow = laminarFlow({ diameterMm: 0.2, lengthMm: 20 }, at);
    expect(flow).toBeCloseTo(6.32492e-6, 10);
    expect((4 * flow) / (Math.PI * 0.2e-3 * AIR.viscosityPaS)).toBeCloseTo(2212.4, 0);
    expect(boreFlow({ diameterMm: 0.2, lengthMm: 20 }, 0.6, at)).toEqual({
      kgS: expect.closeTo(4.5083e-6, 9),
      regime: 'choked',
    });
    expect(boreFlow({ diameterMm: 0.2, lengthMm: 40 }, 0.6, at).regime).toBe('laminar');
    expect(boreFlow({ diameterMm: 0.4, lengthMm: 10 }, 1, at)).toEqual({
      kgS: expect.closeTo(3.0055e-5, 8),
      regime: 'choked',
    });
    expect(boreFlow({ diameterMm: 1, lengthMm: 0 }, 1, { ...room, downstreamPa: 81_060 }).regime).toBe(
      'subcritical',
    );
  });

  it('a gas of little over-pressure flows as a liquid: π d⁴ Δp / 128 μ L', () => {
    const at = { upstreamPa: ATMOSPHERE_PA + 1, downstreamPa: ATMOSPHERE_PA, kelvin: 293.15 };
    const density = ATMOSPHERE_PA / (AIR.gasJkgK * 293.15);
    const liquid = (Math.PI * 0.5e-3 ** 4 * 1) / (128 * AIR.viscosityPaS * 0.01);
    expect(laminarFlow({ diameterMm: 0.5, lengthMm: 10 }, at) / (density * liquid)).toBeCloseTo(1, 4);
  });
});

describe('time to empty, isothermal', () => {
  it('at constant pressure: 5 cm³ through 0.6 mm; 50 cm³ through eight holes of 0.8 mm (A5)', () => {
    expect(expelTimeS(5000, orificeFlow(circle(0.6), 0.6, room), room)).toBeCloseTo(0.148382, 6);
    expect(expelTimeS(50_000, orificeFlow(8 * circle(0.8), 0.8, room), room)).toBeCloseTo(0.078249, 6);
  });

  const eight = (toPa: number, againstPa: number) =>
    evacuationS(50_000, 8 * circle(0.8), 0.8, { fromPa: 101_325, toPa, againstPa, kelvin: 293.15 });

  it('a fixed volume: choked to 20 kPa (A6), on to 12 kPa against 10 kPa below the critical ratio (A7)', () => {
    expect(eight(20_000, 10_000)).toBeCloseTo(0.126966, 6);
    expect(eight(12_000, 10_000)).toBeCloseTo(0.16966, 4);
    expect(eight(12_000, 10_000) - eight(10_000 / CRITICAL_RATIO, 10_000)).toBeCloseTo(0.038388, 4);
  });

  it('agrees with small steps of the flow itself, far below the critical ratio', () => {
    const againstPa = 90_000;
    const area = circle(1.3);
    let [pa, time] = [101_325, 0];
    const steps = 4000;
    const ratio = (90_500 / 101_325) ** (1 / steps);
    for (let k = 0; k < steps; k++) {
      const middle = pa * Math.sqrt(ratio);
      const flow = orificeFlow(area, 0.7, { upstreamPa: middle, downstreamPa: againstPa, kelvin: 310 });
      time += ((pa - pa * ratio) * 20e-6) / (AIR.gasJkgK * 310) / flow;
      pa *= ratio;
    }
    const found = evacuationS(20_000, area, 0.7, { fromPa: 101_325, toPa: 90_500, againstPa, kelvin: 310 });
    expect(found / time).toBeCloseTo(1, 4);
  });

  it('goes with the volume, against area and discharge, and refuses a pressure that is not reached', () => {
    const at = { fromPa: 2e5, toPa: 1.1e5, againstPa: 1e5, kelvin: 296 };
    const one = evacuationS(1000, 1, 0.6, at);
    expect(evacuationS(2000, 1, 0.6, at) / one).toBeCloseTo(2, 12);
    expect(evacuationS(1000, 4, 0.3, at) / one).toBeCloseTo(0.5, 12);
    expect(evacuationS(1000, 1, 0.6, { ...at, toPa: 2e5 })).toBe(0);
    expect(() => evacuationS(1000, 1, 0.6, { ...at, toPa: 1e5 })).toThrow(/each must be above the next/);
  });
});
