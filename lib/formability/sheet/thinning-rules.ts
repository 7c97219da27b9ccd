/**
 * Closed forms for thickness by gauge, all of them for a free sheet of even thickness that freezes where it touches
 * (no slip): d(t A_free) = −t dA_contact. Good for plane strain and as a first guess; in deep round pits 16 to 60 % too
 * thick and high on round walls 21 % too thick against the hyperelastic sheet, which is what the engine runs.
 * Angles in degrees, lengths in one unit of the caller's.
 */

const radians = (degrees: number) => (degrees * Math.PI) / 180;
const STEPS = 4000;

/**
 * Female cone, wall at an angle from the mouth's plane, at a share x = (H − depth) / H of the mouth's radius.
 * Source: R. J. Crawford, Plastics Engineering, 3rd ed. 1998 (as t ~ ((H − S sin β) / H)^(sec β − 1)).
 */
export function coneThinning(wallDeg: number, share: number): number {
  const cos = Math.cos(radians(inRange(wallDeg, 0, 90, 'wall angle')));
  return ((1 + cos) / 2) * inRange(share, 0, 1, 'share of the mouth') ** (1 / cos - 1);
}

/** Long female trough of wedge section, at a share of its half width. Derived here, no source. */
export function wedgeThinning(wallDeg: number, share: number): number {
  const wall = radians(inRange(wallDeg, 0, 90, 'wall angle'));
  if (wall === 0) return 1;
  return (
    (Math.sin(wall) / wall) * inRange(share, 0, 1, 'share of the half width') ** (Math.tan(wall) / wall - 1)
  );
}

/**
 * Female truncated cone with a flat floor: the cone's law until the cap reaches the floor, then a torus arc that
 * shrinks to a corner radius ρ. Derived here, no source.
 */
export function truncatedConeThinning(mouth: number, floor: number, wallDeg: number, corner: number): number {
  const wall = radians(inRange(wallDeg, 0, 90, 'wall angle'));
  const T = Math.tan(wall / 2);
  const cos = Math.cos(wall);
  const first = floor / T;
  const start = coneThinning(wallDeg, inRange((floor * (1 + cos)) / mouth, 0, 1, 'floor against mouth'));
  inRange(corner, 0, first, 'corner radius');
  const area = (rho: number) => wall * rho * (floor - rho * T) + rho * rho * (1 - cos);
  const slope = (rho: number) => wall * (floor - 2 * rho * T) + 2 * rho * (1 - cos);
  const laid = (rho: number) => T * (floor - rho * T + floor + rho * T * cos);
  return start * Math.exp(-integrate((rho) => (laid(rho) - slope(rho)) / area(rho), corner, first));
}

/** Wall of a female cylinder at a depth of no more than height − radius. Derived here, no source. */
export function cylinderWallThinning(radius: number, depth: number): number {
  return Math.exp(-inRange(depth, 0, Infinity, 'depth') / radius) / 2;
}

/** Foot of a female cylinder of height ≥ radius, filled to a corner radius. Derived here, no source. */
export function cylinderCornerThinning(radius: number, height: number, corner: number): number {
  const x = inRange(corner / radius, 0, 1, 'corner radius by cylinder radius');
  const a = (4 - Math.PI) / Math.PI;
  // Balance of a quarter torus, A = π² ρ (R − ρ) + 2π ρ², by partial fractions.
  const b = (2 * Math.PI - 6) / (Math.PI - 2) + a;
  return cylinderWallThinning(radius, height - radius) * x ** a * (2 / (Math.PI - (Math.PI - 2) * x)) ** b;
}

/** Free dome of a height over its clamp radius: mean thickness (area of a cap). */
export function domeMean(heightByRadius: number): number {
  return 1 / (1 + heightByRadius ** 2);
}

/** Its pole, points moving at right angles to the caps: R. Hill, Phil. Mag. 41 (1950) 1133–1142, from memory. */
export function domePole(heightByRadius: number): number {
  return domeMean(heightByRadius) ** 2;
}

/**
 * Long vertical wall of a height at a gap from the clamp: thickness at a distance up the wall, or along the floor,
 * from the foot. Exact for any law of the sheet, for in plane strain the free strip has one tension. Derived here.
 */
export function ridgeThinning(gap: number, height: number, distance: number): number {
  const arc = (y: number) => {
    const radius = (gap * gap + y * y) / (2 * gap);
    return radius * Math.atan2(y, radius - gap);
  };
  const from = Math.min(inRange(distance, 0, height, 'distance from the foot'), height);
  if (height < gap) throw new RangeError(`the wall (${height}) must be no lower than the gap (${gap})`);
  const to = Math.max(from, gap);
  const slide = Math.exp(-integrate((y) => 1 / arc(y), to, height)) * (arc(height) / arc(to));
  return (gap / arc(height)) * slide * Math.min(1, from / gap) ** (4 / Math.PI - 1);
}

function inRange(value: number, least: number, most: number, name: string): number {
  if (value >= least && value <= most) return value;
  throw new RangeError(`${name} is ${value}: give ${least} to ${most}`);
}

/** Simpson's rule. */
function integrate(f: (x: number) => number, from: number, to: number): number {
  const step = (to - from) / STEPS;
  if (step === 0) return 0;
  let sum = f(from) + f(to);
  for (let k = 1; k < STEPS; k++) sum += f(from + k * step) * (k & 1 ? 4 : 2);
  return (sum * step) / 3;
}
