import type { TemplateField } from '@/lib/formability/sheet/obstacle';

type Height = (x: number, y: number) => number;

/** A height field of width × depth about the origin (or `at`), from a formula. */
export function field(
  [width, depth]: [number, number],
  height: Height,
  cellMm = 0.25,
  [atX, atY]: [number, number] = [0, 0],
): TemplateField {
  const nx = Math.round(width / cellMm);
  const ny = Math.round(depth / cellMm);
  const [originX, originY] = [atX - (nx * cellMm) / 2, atY - (ny * cellMm) / 2];
  const heights = new Float64Array(nx * ny);
  for (let j = 0; j < ny; j++) {
    for (let i = 0; i < nx; i++) {
      heights[j * nx + i] = height(originX + (i + 0.5) * cellMm, originY + (j + 0.5) * cellMm);
    }
  }
  return { cellMm, nx, ny, originX, originY, heights };
}

/** Block with drafted walls, base width × depth. */
export function block(width: number, depth: number, high: number, draftDeg: number): Height {
  const tan = Math.tan((draftDeg * Math.PI) / 180);
  return (x, y) => {
    const inwards = Math.min(width / 2 - Math.abs(x), depth / 2 - Math.abs(y));
    if (inwards <= 0) return 0;
    return tan === 0 ? high : Math.min(high, inwards / tan);
  };
}

/** Round frustum by its top radius. */
export function frustum(top: number, high: number, draftDeg: number): (r: number) => number {
  const tan = Math.tan((draftDeg * Math.PI) / 180);
  return (r) => (r <= top ? high : Math.max(0, high - (r - top) / tan));
}
