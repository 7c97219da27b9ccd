import { describe, expect, it } from 'vitest';
import { box, dome, extrude, frustum, lathe } from '../../../fixtures/meshes/solids';
import { polygonPerimeter, reportOn } from '../run-engine';

const rad = Math.PI / 180;
const near = (value: number, expected: number, share: number) =>
  expect(Math.abs(value / expected - 1), `${value} against ${expected}`).toBeLessThan(share);

describe('plan, formed area and draw ratios', () => {
  it('a box 100 × 60 × 40 in the default frame: five faces over the frame', () => {
    const { plan } = reportOn(box(100, 60, 40));
    expect(plan.frameMm).toEqual([160, 120]);
    near(plan.planAreaMm2, 6000, 1e-9);
    near(plan.formedAreaMm2, 160 * 120 + 2 * 40 * (100 + 60), 1e-6);
    near(plan.arealDrawRatio, 1 + 12_800 / 19_200, 1e-6);
    near(plan.linearDrawRatioX, 1 + 80 / 160, 0.002);
    near(plan.linearDrawRatioY, 1 + 80 / 120, 0.002);
    near(plan.depthRatio, 40 / 120, 1e-9);
  });

  it('row R5 the other way up: the same box over its own plan stretches 3.133333 times', () => {
    const { plan } = reportOn(box(100, 60, 40));
    near((plan.formedAreaMm2 - plan.frameAreaMm2 + plan.planAreaMm2) / plan.planAreaMm2, 3.133333, 1e-6);
  });

  it('row R4: a cone D 100, H 100 over its own plan stretches 2.236068 times', () => {
    const sides = 256;
    const { plan } = reportOn(lathe([[0, 0], [50, 0], [0, 100]], sides)); // prettier-ignore
    const own = (plan.formedAreaMm2 - plan.frameAreaMm2 + plan.planAreaMm2) / plan.planAreaMm2;
    near(own, Math.hypot(1, 100 / (50 * Math.cos(Math.PI / sides))), 1e-5);
    near(own, 2.236068, 1e-3);
    near(plan.linearDrawRatioX, 1 + (2 * Math.hypot(50, 100) - 100) / 160, 0.003);
  });

  it('row R6: a frustum 50/40/60, top and wall over its foot', () => {
    const { plan } = reportOn(lathe([[0, 0], [50, 0], [40, 60], [0, 60]], 512)); // prettier-ignore
    const wallAndTop = plan.formedAreaMm2 - plan.frameAreaMm2 + plan.planAreaMm2;
    near(wallAndTop / plan.planAreaMm2, ((50 + 40) * Math.hypot(10, 60) + 40 ** 2) / 50 ** 2, 1e-3);
  });

  it('row R7: a male cylinder D 60, H 40 in a clamp of the area of Ø140 stretches 1.489796 times', () => {
    const frameMm: [number, number] = [140, (Math.PI * 70 ** 2) / 140];
    const { plan } = reportOn(lathe([[0, 0], [30, 0], [30, 40], [0, 40]], 512), { machine: { frameMm } }); // prettier-ignore
    near(plan.arealDrawRatio, 1.489796, 1e-4);
    near(plan.arealDrawRatio, 1 + (40 * polygonPerimeter(30, 512)) / (Math.PI * 70 ** 2), 1e-6);
  });

  it('a hemisphere adds one plan area: 2πr² over πr²', () => {
    const { plan } = reportOn(dome(50, 192, 96));
    near((plan.formedAreaMm2 - plan.frameAreaMm2 + plan.planAreaMm2) / (Math.PI * 2500), 2, 0.002);
    near(plan.linearDrawRatioX, 1 + (Math.PI * 50 - 100) / 160, 0.003);
  });

  it('below a lip the sheet hangs straight down: a T is formed like the box round it', () => {
    const t = [[-10, 0], [10, 0], [10, 20], [30, 20], [30, 30], [-30, 30], [-30, 20], [-10, 20]] as [number, number][]; // prettier-ignore
    const { plan } = reportOn(extrude(t, 60));
    near(plan.planAreaMm2, 3600, 0.003);
    near(plan.formedAreaMm2, 120 * 120 + 4 * 60 * 30, 0.005);
  });

  it('a round lip too, turned out of the grid: mushroom as a cylinder r 20, h 30', () => {
    const { plan } = reportOn(lathe([[0, 0], [10, 0], [10, 20], [20, 20], [20, 30], [0, 30]], 90)); // prettier-ignore
    near(plan.formedAreaMm2, 10_000 + 30 * polygonPerimeter(20, 90), 0.005);
  });

  it('vents are closed for the sheet', () => {
    const cup = (r: number) => lathe([[r, 0], [40, 0], [40, 30], [15, 30], [15, 10], [r, 10]], 64); // prettier-ignore
    const [open, closed] = [reportOn(cup(0.5)), reportOn(lathe([[0, 0], [40, 0], [40, 30], [15, 30], [15, 10], [0, 10]], 64))]; // prettier-ignore
    near(open.plan.formedAreaMm2, closed.plan.formedAreaMm2, 1e-3);
  });

  it('takes a given frame, and doubles with the size', () => {
    const given = reportOn(frustum(100, 80, 30, 5), { machine: { frameMm: [200, 150] } }).plan;
    expect(given).toMatchObject({ frameMm: [200, 150], frameAreaMm2: 30_000 });
    near(given.depthRatio, 0.2, 1e-9);
    const inset = 30 * Math.tan(5 * rad);
    const lateral = 2 * (100 + 80 - 2 * inset) * (30 / Math.cos(5 * rad));
    near(given.formedAreaMm2, 30_000 - 8000 + (100 - 2 * inset) * (80 - 2 * inset) + lateral, 1e-6);
  });
});
