'use client';

import { useRef, useState } from 'react';
import type { NotePin } from '@/app/_components/note-editor/note-draft';
import type { Point, StageCamera } from '@/app/_components/stage/stage-props';
import type { SectionLine } from '@/lib/stage-model/section';
import { viewOf, type Bounds } from '../_components/stage-pins';

/**
 * What the stage looks at, where it is cut, and whether it waits for somebody to name a place. Until somebody
 * moves it, the cut goes through `start`, the first place that the docket names.
 */
export function useStageFocus(bounds: Bounds | null, start: Point | null) {
  const [view, setView] = useState<StageCamera | null>(null);
  const [highlight, setHighlight] = useState<Point | null>(null);
  const [activePin, setActivePin] = useState<string | null>(null);
  const [line, setLine] = useState<SectionLine | null>(null);
  const [placing, setPlacing] = useState(false);
  const taker = useRef<((pin: NotePin | null) => void) | null>(null);
  const shownLine: SectionLine | null =
    line ?? (bounds ? { axis: 'y', atMm: round(start?.[1] ?? (bounds.min[1] + bounds.max[1]) / 2) } : null);

  const settle = (pin: NotePin | null) => {
    setPlacing(false);
    taker.current?.(pin);
    taker.current = null;
  };

  return {
    view,
    highlight,
    activePin,
    line: shownLine,
    setLine,
    placing,
    /** Flies to a place and cuts the section through it. */
    look(at: Point, pin: string | null, kept: StageCamera | null = null) {
      if (!bounds) return;
      setView(kept ? { ...kept } : viewOf(at, bounds));
      setHighlight(at);
      setActivePin(pin);
      const axis = shownLine?.axis ?? 'y';
      setLine({ axis, atMm: round(at[axis === 'y' ? 1 : 0]) });
    },
    /** Shows a place without moving the eye. */
    point(at: Point) {
      setHighlight(at);
      setActivePin(null);
    },
    clear() {
      setHighlight(null);
      setActivePin(null);
    },
    ask(take: (pin: NotePin | null) => void) {
      taker.current = take;
      setPlacing(true);
    },
    place: (at: Point, normal: Point, eye: StageCamera) => settle({ at, normal, view: eye }),
    cancel: () => settle(null),
  };
}

const round = (mm: number) => Math.round(mm * 10) / 10;
