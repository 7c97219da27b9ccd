import type { Point, StageCamera, StagePin } from '@/app/_components/stage/stage-props';
import type { Units } from '@/app/_components/preferences';
import { checkName } from '@/lib/review/check-words';
import type { DocketGroup, DocketItem } from './docket-items';
import { figureWords, pairMark } from './measure-of';

export interface Bounds {
  min: Point;
  max: Point;
}

/** Places of the finding that is looked at which get a mark; of the others only the worst one does. */
const marksWhenActive = 8;

const states: Record<DocketGroup, StagePin['state']> = {
  settle: 'must-settle',
  look: 'look',
  after: 'look',
  settled: 'settled',
  fine: 'settled',
  unchecked: 'settled',
};

/** Key of the docket item that a pin belongs to. */
export function itemOfPin(pinId: string): string {
  return pinId.replace(/#\d+$/, '');
}

/**
 * Marks on the model: pinned threads, and the places of findings that are not simply fine. What is settled is marked
 * only while it is looked at, so that the marks say what is still to do.
 */
export function stagePins(
  items: readonly DocketItem[],
  bounds: Bounds,
  units: Units,
  active: string | null = null,
): StagePin[] {
  return items.flatMap((item): StagePin[] => {
    const { finding, thread, key, group } = item;
    if (states[group] === 'settled' && key !== active) return [];
    if (thread?.pin) {
      const { at, normal, view } = thread.pin;
      return [
        {
          id: `${key}#0`,
          at,
          normal,
          state: states[group],
          label: labelOf(item, units),
          view: view as StageCamera | null,
        },
      ];
    }
    if (!finding) return [];
    return finding.places.slice(0, key === active ? marksWhenActive : 1).map((place, index) => ({
      id: `${key}#${index}`,
      at: place.at,
      normal: outwardAt(place.at, bounds),
      state: states[group],
      label: index === 0 ? labelOf(item, units) : checkName(finding.checkId),
    }));
  });
}

/** The place that an item is about: its pin, else its first place. */
export function placeOf({ finding, thread }: DocketItem): Point | null {
  return thread?.pin?.at ?? finding?.places[0]?.at ?? null;
}

/** True where the middle of the place is what is meant: a pin, a vent, a pocket's floor; else it lies on a wall or an edge. */
export function isExactPlace({ finding, thread }: DocketItem): boolean {
  return thread?.pin != null || finding?.checkId === 'vents' || finding?.checkId === 'air';
}

function labelOf({ finding, thread }: DocketItem, units: Units): string {
  if (finding) {
    const { checkId, measured, unit } = finding;
    // `Edges` for `Edges and corners`: a mark has room for its figures only with a short name.
    const name = checkName(checkId).split(/ (?:and|on|over|under) /)[0];
    const pair = pairMark(finding, units);
    if (pair) return `${name} ${pair}`;
    return measured === null ? name : `${name} ${figureWords(measured, unit, units)}`;
  }
  const text = thread?.notes[0]?.text ?? 'Note';
  return text.length > 28 ? `${text.slice(0, 26)}…` : text;
}

/** Away from the middle of the part and up: a finding names a place, not a surface. */
export function outwardAt(at: Point, { min, max }: Bounds): Point {
  const x = at[0] - (min[0] + max[0]) / 2;
  const y = at[1] - (min[1] + max[1]) / 2;
  const flat = Math.hypot(x, y);
  if (flat < 1e-6) return [0, 0, 1];
  const up = 0.7;
  const length = Math.hypot(1, up);
  return [x / flat / length, y / flat / length, up / length];
}

/** An eye that looks at a place from outside and above, near enough to see its surroundings. */
export function viewOf(at: Point, bounds: Bounds): StageCamera {
  const size = Math.hypot(...[0, 1, 2].map((axis) => bounds.max[axis] - bounds.min[axis]));
  const towards = outwardAt(at, bounds);
  const away = Math.max(size, 30);
  return {
    target: at,
    position: [0, 1, 2].map((axis) => at[axis] + towards[axis] * away) as Point,
    up: Math.abs(towards[2]) > 0.999 ? [0, 1, 0] : [0, 0, 1],
  };
}
