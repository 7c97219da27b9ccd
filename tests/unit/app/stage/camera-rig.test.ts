import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  between,
  describeView,
  faceTo,
  fit,
  fromCamera,
  pan,
  rigAxes,
  STANDARD_VIEWS,
  toCamera,
  turn,
  zoom,
  type RigState,
} from '@/app/_components/stage/camera-rig';
import { toScreen } from '@/app/_components/stage/surface-picker';
import { viewAxes } from '@/lib/stage-model/rasterise';

const state: RigState = { azimuth: 30, elevation: 20, target: [5, -3, 8], span: 120 };
const size = { width: 900, height: 500 };
const bounds = {
  min: [-91, -61, 0] as [number, number, number],
  max: [91, 61, 40] as [number, number, number],
};

const anyState = fc.record({
  azimuth: fc.double({ min: 0, max: 359.9, noNaN: true }),
  elevation: fc.double({ min: -90, max: 90, noNaN: true }),
  target: fc.tuple(...[0, 1, 2].map(() => fc.double({ min: -500, max: 500, noNaN: true }))) as fc.Arbitrary<
    [number, number, number]
  >,
  span: fc.double({ min: 1, max: 2000, noNaN: true }),
});

describe('the camera rig', () => {
  it('records a view and returns to it, straight up and down included, seed 5', () => {
    fc.assert(
      fc.property(anyState, (was) => {
        const back = fromCamera(toCamera(was));
        expect(back.elevation).toBeCloseTo(was.elevation, 4);
        expect(back.span).toBeCloseTo(was.span, 6);
        back.target.forEach((v, i) => expect(v).toBeCloseTo(was.target[i], 9));
        const [a, b] = [rigAxes(was), rigAxes(back)];
        a.right.forEach((v, i) => expect(b.right[i]).toBeCloseTo(v, 3));
      }),
      { seed: 5, numRuns: 300, examples: [[{ ...state, elevation: 90 }], [{ ...state, elevation: -90 }]] },
    );
  });

  it('looks the same way as the pictures do', () => {
    for (const { azimuth, elevation } of STANDARD_VIEWS) {
      const [mine, picture] = [
        rigAxes({ azimuth, elevation }),
        viewAxes({ azimuthDeg: azimuth, elevationDeg: elevation }),
      ];
      for (const axis of ['right', 'up', 'toEye'] as const) {
        mine[axis].forEach((v, i) => expect(v).toBeCloseTo(picture[axis][i], 12));
      }
    }
  });

  it('stops at straight up and down and goes round without end', () => {
    expect(turn(state, 350, 200)).toMatchObject({ azimuth: 20, elevation: 90 });
    expect(turn(state, -40, -200)).toMatchObject({ azimuth: 350, elevation: -90 });
  });

  it('keeps the place under the pointer while zooming, within its limits', () => {
    const at: [number, number, number] = [20, 10, 14];
    const before = toScreen(at, state, size);
    const mm = state.span / size.height;
    const held: [number, number] = [(before[0] - size.width / 2) * mm, (size.height / 2 - before[1]) * mm];
    const closer = zoom(state, 3, held, [1, 1000]);
    expect(closer.span).toBeCloseTo(40, 9);
    toScreen(at, closer, size).forEach((v, i) => expect(v).toBeCloseTo(before[i], 6));
    expect(zoom(state, 1e9, held, [2, 1000]).span).toBe(2);
  });

  it('shifts what is seen by as much as was asked', () => {
    const at: [number, number, number] = [1, 2, 3];
    const [a, b] = [toScreen(at, state, size), toScreen(at, pan(state, 12, 6), size)];
    const pxPerMm = size.height / state.span;
    expect(b[0] - a[0]).toBeCloseTo(12 * pxPerMm, 6);
    expect(b[1] - a[1]).toBeCloseTo(-6 * pxPerMm, 6);
  });

  it.each(STANDARD_VIEWS.map((v) => [v.id, v] as const))(
    'fits all of the template into the %s view',
    (_, view) => {
      const fitted = fit({ ...state, ...view }, bounds, size.width / size.height);
      let reach = 0;
      for (const x of [0, 1]) {
        for (const y of [0, 1]) {
          for (const z of [0, 1]) {
            const corner = [x, y, z].map((k, a) => [bounds.min, bounds.max][k][a]) as [
              number,
              number,
              number,
            ];
            const [sx, sy] = toScreen(corner, fitted, size);
            expect(sx).toBeGreaterThan(0);
            expect(sx).toBeLessThan(size.width);
            expect(sy).toBeGreaterThan(0);
            expect(sy).toBeLessThan(size.height);
            reach = Math.max(reach, Math.abs(sx / size.width - 0.5), Math.abs(sy / size.height - 0.5));
          }
        }
      }
      expect(reach).toBeGreaterThan(0.4);
    },
  );

  it('faces a wall from outside and glides the short way round', () => {
    const faced = faceTo(state, [91, 0, 7], [0.99, 0, 0.12]);
    expect(faced.azimuth).toBeCloseTo(90, 6);
    expect(faced.target).toEqual([91, 0, 7]);
    expect(rigAxes(faced).toEye[0]).toBeGreaterThan(0.5);
    expect(faceTo(state, [0, 0, 5], [0.3, 0, -0.9]).elevation).toBe(-35);
    expect(between({ ...state, azimuth: 350 }, { ...state, azimuth: 20 }, 0.5).azimuth).toBeCloseTo(5, 9);
    expect(between(state, { ...state, span: 480 }, 0.5).span).toBeCloseTo(240, 9);
  });

  it('says in words where it looks from', () => {
    expect(describeView({ azimuth: 45, elevation: 35.264 })).toBe('isometric view');
    expect(describeView({ azimuth: 0, elevation: -90 })).toBe('underside view');
    expect(describeView({ azimuth: 130, elevation: -10 })).toBe(
      'seen from the back right, 10° below the bed plane',
    );
  });
});
