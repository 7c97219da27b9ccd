/**
 * Six times the signed volume of four vertices: positive where d lies on the side that the normal of a, b, c
 * (counter-clockwise) points to. The vertices are put in one order before anything is reckoned, so the same four
 * give the same bits from whichever facet they are asked: neighbours never disagree about what passes between them.
 */
export function orientation(p: Float64Array, a: number, b: number, c: number, d: number): number {
  let sign = 1;
  let swap = 0;
  if (a > b) {
    swap = a;
    a = b;
    b = swap;
    sign = -sign;
  }
  if (c > d) {
    swap = c;
    c = d;
    d = swap;
    sign = -sign;
  }
  if (a > c) {
    swap = a;
    a = c;
    c = swap;
    sign = -sign;
  }
  if (b > d) {
    swap = b;
    b = d;
    d = swap;
    sign = -sign;
  }
  if (b > c) {
    swap = b;
    b = c;
    c = swap;
    sign = -sign;
  }
  const i = 3 * a;
  const j = 3 * b;
  const k = 3 * c;
  const l = 3 * d;
  const ux = p[j] - p[i];
  const uy = p[j + 1] - p[i + 1];
  const uz = p[j + 2] - p[i + 2];
  const vx = p[k] - p[i];
  const vy = p[k + 1] - p[i + 1];
  const vz = p[k + 2] - p[i + 2];
  const wx = p[l] - p[i];
  const wy = p[l + 1] - p[i + 1];
  const wz = p[l + 2] - p[i + 2];
  return sign * ((uy * vz - uz * vy) * wx + (uz * vx - ux * vz) * wy + (ux * vy - uy * vx) * wz);
}
