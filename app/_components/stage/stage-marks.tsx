'use client';

import { useSyncExternalStore } from 'react';
import type { SectionLine } from '@/lib/stage-model/section';
import type { Bounds } from './camera-rig';
import type { Kept } from './layout-pin-labels';
import { PinLayer } from './pin-layer';
import { SectionMarks } from './section-marks';
import type { Point, StagePin } from './stage-props';
import { toScreen } from './surface-picker';
import type { StageEngine } from './use-stage-engine';

/** What lies over the model and follows it: pins, the cutting line, the place about to be pinned, the cross-hair. */
export function StageMarks(props: {
  engine: StageEngine;
  bounds: Bounds;
  pins: readonly StagePin[];
  activePin: string | null;
  onPinSelect?: (id: string) => void;
  sectionLine: SectionLine | null;
  onSectionLineChange?: (line: SectionLine) => void;
  /** the surface point under the pointer while a pin is being placed */
  ghost: Point | null;
  highlight: Point | null;
  crossHair: boolean;
  kept: Kept | null;
}) {
  const { engine, pins, sectionLine, ghost, highlight } = props;
  const { control, picker } = engine;
  const frame = useSyncExternalStore(control.subscribe, control.lastFrame, () => null);
  if (!frame) return null;
  const onScreen = (at: Point) => toScreen(at, frame.rig, frame);
  const spot = highlight && onScreen(highlight);
  const shadow = ghost && onScreen(ghost);
  return (
    <div className="pointer-events-none absolute inset-0 overflow-hidden *:pointer-events-auto [&>svg]:pointer-events-none">
      {sectionLine ? (
        <SectionMarks
          line={sectionLine}
          bounds={props.bounds}
          frame={frame}
          toScreen={onScreen}
          isHidden={(at) => picker.isHidden(at, frame.rig)}
          onChange={props.onSectionLineChange}
        />
      ) : null}
      <PinLayer
        pins={pins.map((pin) => {
          const [x, y] = onScreen(pin.at);
          return { pin, x, y, hidden: picker.isHidden(pin.at, frame.rig) };
        })}
        active={props.activePin}
        width={frame.width}
        height={frame.height}
        kept={props.kept}
        onSelect={props.onPinSelect}
      />
      <svg aria-hidden className="absolute inset-0 size-full">
        {spot ? (
          <g className="fill-none stroke-verdigris" strokeWidth="1.6">
            <path d={`M${spot[0] - 9} ${spot[1]}h5m8 0h5M${spot[0]} ${spot[1] - 9}v5m0 8v5`} />
          </g>
        ) : null}
        {shadow ? (
          <rect
            x={shadow[0] - 4}
            y={shadow[1] - 4}
            width="8"
            height="8"
            className="fill-sheet stroke-verdigris"
            strokeWidth="1.6"
          />
        ) : null}
        {props.crossHair ? (
          <g transform={`translate(${frame.width / 2} ${frame.height / 2})`} fill="none">
            <path d="M-16 0h11m10 0h11M0 -16v11m0 10v11" className="stroke-sheet" strokeWidth="3.2" />
            <path d="M-16 0h11m10 0h11M0 -16v11m0 10v11" className="stroke-ink" strokeWidth="1.2" />
          </g>
        ) : null}
      </svg>
    </div>
  );
}
