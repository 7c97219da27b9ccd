import { clampedRectangle } from './clamped-rectangle';
import { inRange } from './in-range';

/** Deflection and stress of a plate under even pressure. */
export interface PlateAnswer {
  sagMm: number;
  stressMPa: number;
}

/** Thickness mm, pressure and modulus MPa. Valid for sag below half the thickness, thickness below a quarter span. */
export interface Plate {
  thicknessMm: number;
  pressureMPa: number;
  modulusMPa: number;
  poisson: number;
}

/** Flexural rigidity E h³ / 12 (1 − ν²), N·mm. */
export function rigidity({ thicknessMm: h, modulusMPa: e, poisson: nu }: Plate): number {
  if (!(h > 0) || !(e > 0) || !(nu > -1 && nu <= 0.5))
    throw new RangeError(
      `a plate of ${h} mm, ${e} MPa, Poisson's ratio ${nu}: give a thickness and modulus above 0 and a ratio of −1 to 0.5`,
    );
  return (e * h ** 3) / (12 * (1 - nu * nu));
}

/** Largest stress of a bending moment per length, MPa. */
function stressOf(moment: number, h: number): number {
  return (6 * Math.abs(moment)) / (h * h);
}

/** Strip clamped along both sides, span mm. S. Timoshenko, S. Woinowsky-Krieger, Theory of Plates and Shells, 2nd ed. */
export function clampedStrip(plate: Plate, spanMm: number): PlateAnswer {
  const { pressureMPa: q, thicknessMm: h } = plate;
  return { sagMm: (q * spanMm ** 4) / (384 * rigidity(plate)), stressMPa: (q * spanMm ** 2) / (2 * h * h) };
}

/** Strip simply supported along both sides, span mm. Same source. */
export function supportedStrip(plate: Plate, spanMm: number): PlateAnswer {
  const { pressureMPa: q, thicknessMm: h } = plate;
  return {
    sagMm: (5 * q * spanMm ** 4) / (384 * rigidity(plate)),
    stressMPa: stressOf((q * spanMm ** 2) / 8, h),
  };
}

/** Disc of a radius in mm, clamped at its rim. Same source, chapter 3. */
export function clampedDisc(plate: Plate, radiusMm: number): PlateAnswer {
  const { pressureMPa: q, thicknessMm: h } = plate;
  return {
    sagMm: (q * radiusMm ** 4) / (64 * rigidity(plate)),
    stressMPa: (0.75 * q * radiusMm ** 2) / (h * h),
  };
}

/** Disc of a radius in mm, simply supported. */
export function supportedDisc(plate: Plate, radiusMm: number): PlateAnswer {
  const { pressureMPa: q, thicknessMm: h, poisson: nu } = plate;
  return {
    sagMm: ((5 + nu) * q * radiusMm ** 4) / (64 * (1 + nu) * rigidity(plate)),
    stressMPa: (3 * (3 + nu) * q * radiusMm ** 2) / (8 * h * h),
  };
}

/** Equilateral triangle of a height in mm, simply supported. Same source, chapter 9. */
export function supportedTriangle(plate: Plate, heightMm: number): PlateAnswer {
  const { pressureMPa: q, thicknessMm: h, poisson: nu } = plate;
  return {
    sagMm: (q * heightMm ** 4) / (972 * rigidity(plate)),
    stressMPa: stressOf(((1 + nu) * q * heightMm ** 2) / 54, h),
  };
}

/** Terms of Navier's series either way: sag to nine digits, moment to five. */
const NAVIER = 200;

/** Rectangle simply supported on all sides (Navier's double series), sides in mm. */
export function supportedRectangle(plate: Plate, sideMm: number, otherMm: number): PlateAnswer {
  const { pressureMPa: q, thicknessMm: h, poisson: nu } = plate;
  const a = Math.min(sideMm, otherMm);
  const b = Math.max(sideMm, otherMm);
  let sag = 0;
  let mx = 0;
  for (let m = 1; m < NAVIER; m += 2) {
    for (let n = 1; n < NAVIER; n += 2) {
      const [x, y] = [(m * m) / (a * a), (n * n) / (b * b)];
      const sign = ((m + n) / 2) % 2 === 1 ? 1 : -1;
      const shape = sign / (m * n * (x + y) ** 2);
      sag += shape;
      mx += shape * (x + nu * y);
    }
  }
  return {
    sagMm: (16 * q * sag) / (Math.PI ** 6 * rigidity(plate)),
    stressMPa: stressOf((16 * q * mx) / Math.PI ** 4, h),
  };
}

/** Rectangle clamped on all sides, sides in mm; the stress is the larger of rim (middle of the long side) and middle. */
export function clampedPlate(plate: Plate, sideMm: number, otherMm: number): PlateAnswer {
  const { pressureMPa: q, thicknessMm: h, poisson } = plate;
  const a = Math.min(sideMm, otherMm);
  const { sag, edgeMoment, centre } = clampedRectangle(Math.max(sideMm, otherMm) / a);
  const moment = Math.max(edgeMoment, centre.across + poisson * centre.along);
  return { sagMm: (sag * q * a ** 4) / rigidity(plate), stressMPa: stressOf(moment * q * a * a, h) };
}

/** Pressure at which a long empty ring or tube of radius R buckles, MPa: E t³ / 4 (1 − ν²) R³ (Timoshenko and Gere). */
export function ringCollapseMPa(
  modulusMPa: number,
  poisson: number,
  wallMm: number,
  radiusMm: number,
): number {
  inRange('modulus (MPa)', modulusMPa, 0);
  inRange('wall (mm)', wallMm, 0);
  inRange('radius (mm)', radiusMm, 0);
  return (modulusMPa * wallMm ** 3) / (4 * (1 - poisson * poisson) * radiusMm ** 3);
}

/** Critical compressive stress of a long plate between ribs, MPa: 4 π² E / 12 (1 − ν²) · (t/b)². */
export function ribBucklingMPa(
  modulusMPa: number,
  poisson: number,
  thicknessMm: number,
  widthMm: number,
): number {
  inRange('modulus (MPa)', modulusMPa, 0);
  inRange('width between ribs (mm)', widthMm, 0);
  return ((4 * Math.PI ** 2 * modulusMPa) / (12 * (1 - poisson * poisson))) * (thicknessMm / widthMm) ** 2;
}
