/** A mark on the stage, CSS pixels, and the size of the words that go with it. */
export interface PinMark {
  id: string;
  x: number;
  y: number;
  labelWidth: number;
  /** shown first and at any price */
  first: boolean;
}

export interface PlacedLabel {
  id: string;
  /** left end of the line that the words stand on */
  x: number;
  y: number;
  /** end of the leader, on the near end of that line */
  elbowX: number;
}

const REACH_X = 26;
const REACH_Y = 28;
const LINE_HEIGHT = 20;
const MARGIN = 6;

/**
 * Places the words beside their marks, right and below first as in the drawings, then the other corners; words that
 * would lie on others, on the legend or off the stage are left out (the mark still carries them as its name).
 */
export function layoutPinLabels(
  marks: readonly PinMark[],
  width: number,
  height: number,
  kept: Kept | null = null,
): PlacedLabel[] {
  const placed: (PlacedLabel & { width: number })[] = [];
  const ordered = [...marks].sort((a, b) => Number(b.first) - Number(a.first));
  for (const mark of ordered) {
    if (mark.x < 0 || mark.y < 0 || mark.x > width || mark.y > height) continue;
    const places = [
      [1, 1],
      [1, -1],
      [-1, 1],
      [-1, -1],
    ].map(([sx, sy]) => {
      const elbowX = mark.x + sx * REACH_X;
      const x = sx > 0 ? elbowX : elbowX - mark.labelWidth;
      return { id: mark.id, x, y: mark.y + sy * REACH_Y, elbowX, width: mark.labelWidth };
    });
    const inside = places.filter((p) => insideStage(p, width, height) && !(kept && touches(p, kept)));
    const free = inside.find((p) => !placed.some((q) => overlaps(p, q)) && !marks.some((m) => covers(p, m)));
    const chosen = free ?? (mark.first ? (inside[0] ?? places[0]) : undefined);
    if (chosen) placed.push(chosen);
  }
  return placed.map(({ id, x, y, elbowX }) => ({ id, x, y, elbowX }));
}

/** A corner of the stage that other words stand on, CSS pixels. */
export interface Kept {
  left: number;
  top: number;
}

function touches(p: Box, kept: Kept): boolean {
  return p.x + p.width > kept.left && p.y > kept.top;
}

type Box = PlacedLabel & { width: number };

function insideStage(p: Box, width: number, height: number): boolean {
  return (
    p.x >= MARGIN && p.x + p.width <= width - MARGIN && p.y >= LINE_HEIGHT + MARGIN && p.y <= height - MARGIN
  );
}

function overlaps(p: Box, q: Box): boolean {
  const across = p.x < q.x + q.width + MARGIN && q.x < p.x + p.width + MARGIN;
  return across && Math.abs(p.y - q.y) < LINE_HEIGHT;
}

function covers(p: Box, mark: PinMark): boolean {
  return (
    mark.id !== p.id &&
    mark.x > p.x - 8 &&
    mark.x < p.x + p.width + 8 &&
    mark.y > p.y - LINE_HEIGHT &&
    mark.y < p.y + 6
  );
}
