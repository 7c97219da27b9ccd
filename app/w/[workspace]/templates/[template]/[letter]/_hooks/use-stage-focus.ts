'use client';

import { useCallback, useRef, useState } from 'react';
import type { NotePin } from '@/app/_components/note-editor/note-draft';
import type { Point, StageCamera } from '@/app/_components/stage/stage-props';
import type { SectionLine } from '@/lib/stage-model/section';
import { cutThrough, openingCut } from '../_components/cut-line';
import { viewOf, type Bounds } from '../_components/stage-pins';

/** How the cut came to be where it is: the page opened with it, a place was looked at, or somebody moved it. */
export type CutBy = 'opening' | 'place' | 'hand';

/** What the stage looks at, where it is cut, and whether it waits for somebody to name a place. */
export function useStageFocus(bounds: Bounds | null) {
  const [view, setView] = useState<StageCamera | null>(null);
  const [highlight, setHighlight] = useState<Point | null>(null);
  const [activePin, setActivePin] = useState<string | null>(null);
  const [cut, setCut] = useState<{ line: SectionLine; by: CutBy } | null>(null);
  const [placing, setPlacing] = useState(false);
  const taker = useRef<((pin: NotePin | null) => void) | null>(null);
  const setLine = useCallback((next: SectionLine) => setCut({ line: next, by: 'hand' }), []);
  const line = cut?.line ?? (bounds ? openingCut(bounds) : null);

  const settle = (pin: NotePin | null) => {
    setPlacing(false);
    taker.current?.(pin);
    taker.current = null;
  };

  return {
    view,
    highlight,
    activePin,
    line,
    cutBy: cut?.by ?? ('opening' as CutBy),
    setLine,
    placing,
    /** Flies to a place and cuts the section through it, or a little inside of it unless `exact`. */
    look(at: Point, pin: string | null, kept: StageCamera | null = null, exact = false) {
      if (!bounds) return;
      setView(kept ? { ...kept } : viewOf(at, bounds));
      setHighlight(at);
      setActivePin(pin);
      setCut({ line: cutThrough(at, line?.axis ?? 'y', bounds, exact), by: 'place' });
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
