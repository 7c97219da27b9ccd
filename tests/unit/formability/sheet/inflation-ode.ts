/** One state of the inflated membrane along its meridian, lengths by the clamp radius. */
export interface Inflation {
  /** p a / (C1 t0). */
  pressure: number;
  /** Pole height by clamp radius. */
  height: number;
  poleStretch: number;
  edgeAngleDeg: number;
  /** Thickness by gauge, and height, at a material radius (0 to 1). */
  at(share: number): { thickness: number; height: number };
}

const FINEST = 5e-4;
const LEAST_STRETCH = 1 + 1e-5;

/**
 * Clamped circular Mooney-Rivlin membrane (α = C2/C1) under pressure: the equations of J. E. Adkins and R. S. Rivlin,
 * Phil. Trans. A 244 (1952) 505–531 (cited from memory), integrated by fourth-order Runge-Kutta from the pole with
 * p = 1 and 2 C1 t0 = 1 until r = R; they scale, so that radius is the clamp's and no shooting is needed.
 */
export function inflate(poleStretch: number, alpha = 0): Inflation {
  // A shallow dish is small in these units: its radius goes with the strain to the power 3/2.
  const STEP = Math.min(FINEST, 0.01 * (poleStretch - 1) ** 1.5);
  const tension = (l1: number, l2: number) => (l1 / l2 - 1 / (l1 * l2) ** 3) * (1 + alpha * l2 * l2);
  const meridian = (t1: number, l2: number, guess: number) => {
    let l1 = guess;
    for (let k = 0; k < 30; k++) {
      const slope = (1 / l2 + 3 / (l1 ** 4 * l2 ** 3)) * (1 + alpha * l2 * l2);
      const change = (tension(l1, l2) - t1) / slope;
      l1 -= change;
      if (Math.abs(change) < 1e-15 * l1) break;
    }
    return l1;
  };
  let guess = poleStretch;
  // State r, z, T1, θ over R.
  const slope = (R: number, [r, , t1, angle]: number[]): number[] => {
    const l2 = r / R;
    const l1 = (guess = meridian(t1, l2, guess));
    const t2 = (l2 / l1 - 1 / (l1 * l2) ** 3) * (1 + alpha * l1 * l1);
    const dr = l1 * Math.cos(angle);
    return [dr, -l1 * Math.sin(angle), ((t2 - t1) * dr) / r, (l1 * (1 - (t2 * Math.sin(angle)) / r)) / t1];
  };
  const along = (y: number[], d: number[], h: number) => y.map((v, i) => v + h * d[i]);
  const step = (R: number, y: number[], h: number) => {
    const a = slope(R, y);
    const b = slope(R + h / 2, along(y, a, h / 2));
    const c = slope(R + h / 2, along(y, b, h / 2));
    const d = slope(R + h, along(y, c, h));
    return y.map((v, i) => v + (h / 6) * (a[i] + 2 * b[i] + 2 * c[i] + d[i]));
  };
  const poleTension = tension(poleStretch, poleStretch);
  let R = STEP / 50;
  let y = [poleStretch * R, 0, poleTension, (poleStretch * R) / (2 * poleTension)];
  const radii = [R];
  const states = [y];
  for (;;) {
    const next = step(R, y, STEP);
    if (next[0] < R + STEP) break;
    R += STEP;
    y = next;
    radii.push(R);
    states.push(y);
  }
  let [low, high] = [0, STEP];
  for (let k = 0; k < 60; k++) {
    const middle = (low + high) / 2;
    if (step(R, y, middle)[0] < R + middle) high = middle;
    else low = middle;
  }
  radii.push(R + low);
  states.push(step(R, y, low));
  const a = R + low;
  const [, bottom, , edge] = states[states.length - 1];
  const thickness = (i: number) => {
    const l2 = states[i][0] / radii[i];
    return 1 / (meridian(states[i][2], l2, poleStretch) * l2);
  };
  return {
    pressure: 2 * a,
    height: -bottom / a,
    poleStretch,
    edgeAngleDeg: (edge * 180) / Math.PI,
    at(share) {
      const i = Math.min(radii.length - 2, Math.max(0, Math.floor((share * a - radii[0]) / STEP)));
      const part = Math.max(0, (share * a - radii[i]) / (radii[i + 1] - radii[i]));
      const mix = (f: (i: number) => number) => f(i) + part * (f(i + 1) - f(i));
      return { thickness: mix(thickness), height: mix((k) => (states[k][1] - bottom) / a) };
    },
  };
}

/** The state of a given pole height; heights rise with the pole's stretch. */
export function inflateTo(height: number, alpha = 0): Inflation {
  let [before, stretch] = [1.01, 1.01 + height * height];
  let missBefore = inflate(before, alpha).height - height;
  for (let k = 0; k < 30; k++) {
    const miss = inflate(stretch, alpha).height - height;
    if (Math.abs(miss) < 1e-12) break;
    const next = stretch - (miss * (stretch - before)) / (miss - missBefore);
    [before, missBefore, stretch] = [stretch, miss, Math.max(LEAST_STRETCH, next)];
  }
  return inflate(stretch, alpha);
}
