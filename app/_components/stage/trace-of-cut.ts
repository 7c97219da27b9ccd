import type { Section } from '@/lib/stage-model/section';

/** The outline of a cut as pairs of points in space, mm, for drawing it on the model. */
export function traceOfCut({ line, loops }: Section): Float32Array {
  const segments = loops.flatMap((loop) => loop.segments);
  const points = new Float32Array(segments.length * 6);
  segments.forEach(({ from, to }, i) => {
    [from, to].forEach(([u, z], end) => {
      points.set(line.axis === 'y' ? [u, line.atMm, z] : [line.atMm, u, z], i * 6 + end * 3);
    });
  });
  return points;
}
