import { describe, expect, it } from 'vitest';
import { contactC, toolC, type ThermalBody } from '@/lib/formability/physics/conduction';
import { followPulls, type PullSequence } from '@/lib/formability/physics/follow-pulls';

const pla: ThermalBody = { conductivityWmK: 0.17, densityKgM3: 1240, heatJkgK: 1600 };
const hips: ThermalBody = { conductivityWmK: 0.16, densityKgM3: 1050, heatJkgK: 1900 };
const job: PullSequence = {
  sheet: hips,
  gaugeMm: 1,
  formingC: 150,
  demouldC: 80,
  tool: pla,
  shellMm: 40,
  infillShare: 1,
  depthMm: 40,
  ambientC: 25,
  lossWm2K: 15,
  cycleS: 120,
  pulls: 1,
};

describe('pulls followed one by one', () => {
  it('the first touch has the contact temperature of two thick bodies (H2)', () => {
    expect(followPulls(job).surfaceC[0]).toBeCloseTo(contactC(hips, 150, pla, 25), 0);
    expect(followPulls(job).surfaceC[0]).toBeCloseTo(86.6392, 0);
  });

  it('one insulated pull heats each depth as the exact series says, within 0.8 K', () => {
    // Never demoulded, nothing lost: the hottest at each depth is the most that the series comes to within the cycle.
    const { profile } = followPulls({ ...job, lossWm2K: 0, demouldC: 26, cycleS: 60 });
    const laid = { sheet: hips, tool: pla, thicknessMm: 1, sheetC: 150, toolC: 25 };
    for (const { depthMm, firstC } of profile.filter((one) => one.depthMm > 0.2 && one.depthMm < 6)) {
      let most = 0;
      for (let time = 0.5; time <= 60; time += 0.5) most = Math.max(most, toolC(laid, time, depthMm));
      expect(Math.abs(firstC - most), `${depthMm} mm`).toBeLessThan(0.8);
    }
  });

  it('keeps the heat: a lossless template warms by the heat of its sheets over its capacity', () => {
    // 5 mm of template, sheets left on until nearly even: what the sheet had over the mixture goes into both.
    const thin = { ...job, depthMm: 5, shellMm: 5, lossWm2K: 0, demouldC: 26, cycleS: 3000 };
    const { profile } = followPulls(thin);
    const [s, t] = [1050 * 1900 * 1, 1240 * 1600 * 5];
    const even = (s * 150 + t * 25) / (s + t);
    const last = profile[profile.length - 1];
    expect(last.firstC).toBeCloseTo(even, 1);
  });

  it('later sheets meet a warmer template, set later, and in the end alike', () => {
    const { surfaceC, setFirstS, setLastS, setPulls, settled } = followPulls({
      ...job,
      pulls: 100,
      cycleS: 300,
    });
    for (let k = 1; k < surfaceC.length; k++) expect(surfaceC[k]).toBeGreaterThan(surfaceC[k - 1] - 0.05);
    expect(settled).toBe(true);
    expect(setLastS ?? 0).toBeGreaterThan(setFirstS ?? Infinity);
    expect(setPulls).toBe(100);
  });

  it('says when a sheet does not set within the cycle', () => {
    expect(followPulls({ ...job, cycleS: 5 }).setFirstS).toBeNull();
    const hot = followPulls({ ...job, cycleS: 40, pulls: 60, shellMm: 3, infillShare: 0.2 });
    expect(hot.setFirstS).not.toBeNull();
    expect(hot.setLastS).toBeNull();
    expect(hot.setPulls).toBeGreaterThan(0);
    expect(hot.setPulls).toBeLessThan(60);
  });

  it('twice the gauge in four times the time is the same body in other units: like temperatures at like depths', () => {
    const one = followPulls({ ...job, lossWm2K: 10, pulls: 5 });
    const two = followPulls({
      ...job,
      gaugeMm: 2,
      shellMm: 80,
      depthMm: 80,
      cycleS: 480,
      lossWm2K: 5,
      pulls: 5,
    });
    one.surfaceC.forEach((surface, k) => expect(two.surfaceC[k]).toBeCloseTo(surface, 6));
    expect((two.setFirstS ?? 0) / (one.setFirstS ?? 1)).toBeCloseTo(4, 6);
  });

  it('less loss, more pulls and a shorter cycle are hotter', () => {
    const peak = (change: Partial<PullSequence>) =>
      Math.max(...followPulls({ ...job, pulls: 20, shellMm: 4, infillShare: 0.3, ...change }).surfaceC);
    const base = peak({});
    expect(peak({ lossWm2K: 8 })).toBeGreaterThan(base);
    expect(peak({ pulls: 40 })).toBeGreaterThanOrEqual(base);
    expect(peak({ cycleS: 60 })).toBeGreaterThan(base);
    expect(peak({ gaugeMm: 0.5 })).toBeLessThan(base);
  });

  it('a day of pulls is cut short where they are alike, and no more than 200 are followed', () => {
    const long = followPulls({ ...job, pulls: 10_000, shellMm: 4, infillShare: 0.2 });
    expect(long.surfaceC.length).toBeLessThanOrEqual(200);
  });
});
