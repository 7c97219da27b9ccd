'use client';

import clsx from 'clsx';
import { useRef, type KeyboardEvent, type PointerEvent } from 'react';
import type { SectionLine } from '@/lib/stage-model/section';
import { formatLength } from '../format-figure';
import { usePreferences } from '../preferences-context';
import { stepSection } from './step-section';
import { rigAxes, type Bounds } from './camera-rig';
import type { StageFrame } from './stage-control';
import type { Point } from './stage-props';

/** Where the cut's ends lie on the bed plane, clear of the template. */
function ends({ axis, atMm }: SectionLine, { min, max }: Bounds): [Point, Point, Point, Point] {
  const clear = Math.max(max[0] - min[0], max[1] - min[1]);
  const [near, far] = [clear * 0.02, clear * 0.1];
  const at = (along: number): Point => (axis === 'y' ? [along, atMm, min[2]] : [atMm, along, min[2]]);
  const a = axis === 'y' ? 0 : 1;
  return [at(min[a] - far), at(min[a] - near), at(max[a] + near), at(max[a] + far)];
}

/**
 * The cutting line outside the template (on it the cut itself is drawn): long dash and dot, thick at the ends, a letter
 * at each, as ISO 128-3 has it. Either letter is dragged; the first is also a slider for the keyboard.
 */
export function SectionMarks(props: {
  line: SectionLine;
  bounds: Bounds;
  frame: StageFrame;
  toScreen: (at: Point) => [number, number];
  /** true where the template stands between the eye and a point */
  isHidden: (at: Point) => boolean;
  onChange?: (line: SectionLine) => void;
}) {
  const { line, bounds, frame, toScreen, isHidden, onChange } = props;
  const { units } = usePreferences();
  const across = line.axis === 'y' ? 1 : 0;
  const [low, high] = [bounds.min[across], bounds.max[across]];
  const solid = ends(line, bounds);
  const points = solid.map(toScreen);
  const grip = useRef<{ x: number; y: number; atMm: number } | null>(null);

  /** How far one mm across the cut moves it on the screen, CSS pixels. */
  const perMm = (): [number, number] => {
    const { right, up } = rigAxes(frame.rig);
    const scale = frame.height / frame.rig.span;
    return [right[across] * scale, -up[across] * scale];
  };
  const drag = (event: PointerEvent) => {
    if (!grip.current || !onChange) return;
    const [sx, sy] = perMm();
    const reach = sx * sx + sy * sy;
    // Seen along the cut, a drag says nothing about how far to shift it.
    if (reach < 0.01) return;
    const by = ((event.clientX - grip.current.x) * sx + (event.clientY - grip.current.y) * sy) / reach;
    onChange({ ...line, atMm: Math.round(Math.min(high, Math.max(low, grip.current.atMm + by)) * 10) / 10 });
  };
  const press = (event: KeyboardEvent) => {
    const next = stepSection(line, event, low, high);
    if (!next || !onChange) return;
    event.preventDefault();
    event.stopPropagation();
    onChange(next);
  };
  const handle = (point: [number, number], first: boolean, behind: boolean) => (
    <div
      key={first ? 'first' : 'second'}
      role={first ? 'slider' : undefined}
      tabIndex={first ? 0 : undefined}
      aria-label={first ? `Cutting line A–A, ${line.axis}` : undefined}
      aria-hidden={first ? undefined : true}
      aria-valuemin={first ? Math.round(low * 10) / 10 : undefined}
      aria-valuemax={first ? Math.round(high * 10) / 10 : undefined}
      aria-valuenow={first ? line.atMm : undefined}
      aria-valuetext={first ? `${line.axis} = ${formatLength(line.atMm, units, 1)}` : undefined}
      onKeyDown={first ? press : undefined}
      onPointerDown={(event) => {
        event.stopPropagation();
        event.currentTarget.setPointerCapture(event.pointerId);
        grip.current = { x: event.clientX, y: event.clientY, atMm: line.atMm };
      }}
      onPointerMove={drag}
      onPointerUp={() => (grip.current = null)}
      onPointerCancel={() => (grip.current = null)}
      style={{ left: point[0] - 16, top: point[1] - 16 }}
      className={clsx(
        'absolute flex size-8 cursor-move touch-none items-center justify-center text-sm font-semibold select-none',
        behind && 'pointer-events-none! opacity-0 focus-visible:opacity-100',
      )}
    >
      <span className="bg-sheet/80 px-0.5 leading-none">A</span>
    </div>
  );
  const sides = [
    { far: 0, near: 1 },
    { far: 3, near: 2 },
  ].map(({ far, near }) => {
    const [from, to] = [points[far], points[near]];
    const beyond = LETTER_PX / (Math.hypot(to[0] - from[0], to[1] - from[1]) || 1);
    return {
      from,
      to,
      letter: mid(from, to, -beyond),
      behind: isHidden(along(solid[far], solid[near], -beyond)) || isHidden(solid[far]),
      seen: seenPart(solid[far], solid[near], isHidden),
    };
  });
  return (
    <>
      <svg aria-hidden className="pointer-events-none absolute inset-0 size-full">
        {sides
          .filter(({ behind }) => !behind)
          .map(({ from, to, seen }, i) => (
            <g key={i} className="stroke-ink">
              <path d={`M${from}L${mid(from, to, seen)}`} strokeWidth="1.1" strokeDasharray="12 3 2 3" />
              <path d={`M${from}L${mid(from, to, Math.min(0.3, seen))}`} strokeWidth="2.4" />
            </g>
          ))}
      </svg>
      {sides.map(({ letter, behind }, i) => handle(letter, i === 0, behind))}
    </>
  );
}

/** How far outside the end of the line its letter stands, CSS pixels. */
const LETTER_PX = 14;
const SAMPLES = 6;

/** Share of the line, from its far end, that the template does not cover. */
function seenPart(far: Point, near: Point, isHidden: (at: Point) => boolean): number {
  for (let n = 1; n <= SAMPLES; n++) {
    if (isHidden(along(far, near, n / SAMPLES))) return (n - 1) / SAMPLES;
  }
  return 1;
}

function along(a: Point, b: Point, t: number): Point {
  return [0, 1, 2].map((k) => a[k] + (b[k] - a[k]) * t) as Point;
}

function mid(a: [number, number], b: [number, number], t: number): [number, number] {
  return [a[0] + (b[0] - a[0]) * t, a[1] + (b[1] - a[1]) * t];
}
