import { cutSection, type SectionLine, type SectionMesh } from './section';

const STEPS = 64;

/**
 * The line nearest to `line` whose cut meets the mesh, in steps of a 64th of the way from `low` to `high` (mm, across
 * the cut); the line itself where it does, null where none does.
 */
export function meetSection(
  mesh: SectionMesh,
  line: SectionLine,
  [low, high]: readonly [number, number],
): SectionLine | null {
  const meets = (atMm: number) => cutSection(mesh, { axis: line.axis, atMm }).boundsMm !== null;
  if (meets(line.atMm)) return line;
  const step = (high - low) / STEPS;
  const inwards = line.atMm > (low + high) / 2 ? -1 : 1;
  for (let n = 1; n <= STEPS; n++) {
    for (const sense of [inwards, -inwards]) {
      const atMm = Math.round((line.atMm + sense * n * step) * 100) / 100;
      if (atMm > low && atMm < high && meets(atMm)) return { axis: line.axis, atMm };
    }
  }
  return null;
}
