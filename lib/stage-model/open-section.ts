import { cutSection, type SectionLine, type SectionMesh } from './section';

/** How far from the middle a line may lie, as a share of the way across, and in how many steps to each side. */
const REACH = 0.25;
const STEPS = 8;
/** The middle is kept when its outline is at least this share of the longest. */
const ENOUGH = 0.9;

/**
 * The line that tells most of a template to begin with: near `line`, the middle, but through its cups or pockets where
 * the middle runs between their rows. Judged by the length of the outline; null where no line near it meets the mesh.
 */
export function openSection(
  mesh: SectionMesh,
  line: SectionLine,
  [low, high]: readonly [number, number],
): SectionLine | null {
  const step = ((high - low) * REACH) / STEPS;
  const offsets = [0, ...Array.from({ length: STEPS }, (_, i) => [-(i + 1), i + 1]).flat()];
  const lines = offsets.map((n) => {
    const atMm = n === 0 ? line.atMm : Math.round((line.atMm + n * step) * 10) / 10;
    return { line: { axis: line.axis, atMm }, length: outlineLength(mesh, { axis: line.axis, atMm }) };
  });
  const longest = Math.max(...lines.map(({ length }) => length));
  if (longest === 0) return null;
  return lines.find(({ length }, n) => length >= (n === 0 ? ENOUGH : 1) * longest)!.line;
}

function outlineLength(mesh: SectionMesh, line: SectionLine): number {
  let sum = 0;
  for (const { segments } of cutSection(mesh, line).loops)
    for (const { from, to } of segments) sum += Math.hypot(to[0] - from[0], to[1] - from[1]);
  return sum;
}
