'use client';

import clsx from 'clsx';
import { layoutPinLabels, type Kept } from './layout-pin-labels';
import type { PinState, StagePin } from './stage-props';

export interface PinOnStage {
  pin: StagePin;
  x: number;
  y: number;
  hidden: boolean;
}

const STATE_WORDS: Record<PinState, string> = {
  'must-settle': 'must settle',
  look: 'to look at',
  settled: 'settled',
};
const TONE: Record<PinState, string> = {
  'must-settle': 'text-madder',
  look: 'text-ochre-ink',
  settled: 'text-slate',
};
/** Width of one figure of the mono face at its narrow stretch and 11 px; labels are laid out before they are drawn. */
const CHARACTER_PX = 6.4;
const MOST_CHARACTERS = 28;

/** Marks on the model: small squares with a leader and a few words; the shape tells the state as well as the colour. */
export function PinLayer(props: {
  pins: readonly PinOnStage[];
  active: string | null;
  width: number;
  height: number;
  /** where the legend stands */
  kept: Kept | null;
  onSelect?: (id: string) => void;
}) {
  const { pins, active, width, height, kept, onSelect } = props;
  const wordy = pins.filter(({ pin, hidden }) => pin.id === active || (pin.state !== 'settled' && !hidden));
  const labels = new Map(
    layoutPinLabels(
      wordy.map(({ pin, x, y }) => ({
        id: pin.id,
        x,
        y,
        labelWidth: clip(pin.label).length * CHARACTER_PX,
        first: pin.id === active,
      })),
      width,
      height,
      kept,
    ).map((label) => [label.id, label]),
  );
  return (
    <>
      <svg aria-hidden className="pointer-events-none absolute inset-0 size-full">
        {pins.map(({ pin, x, y, hidden }) => {
          const label = labels.get(pin.id);
          const end =
            label && (label.x === label.elbowX ? label.x + clip(pin.label).length * CHARACTER_PX : label.x);
          return (
            <g key={pin.id} className={TONE[pin.state]} opacity={hidden ? 0.55 : 1}>
              {label ? (
                <>
                  <path
                    d={`M${x} ${y}L${label.elbowX} ${label.y}H${end}`}
                    className="fill-none stroke-sheet"
                    strokeWidth="3"
                    strokeOpacity="0.7"
                  />
                  <path
                    d={`M${x} ${y}L${label.elbowX} ${label.y}H${end}`}
                    className="fill-none stroke-current"
                    strokeWidth={pin.id === active ? 1.6 : 1}
                    strokeDasharray={hidden ? '3 3' : undefined}
                  />
                  <text
                    x={label.x}
                    y={label.y - 5}
                    className={clsx(
                      'fill-current stroke-sheet font-mono text-[11px]',
                      pin.id === active && 'font-semibold',
                    )}
                    strokeWidth="3.5"
                    paintOrder="stroke"
                    strokeLinejoin="round"
                  >
                    {clip(pin.label)}
                  </text>
                </>
              ) : null}
              <PinMark x={x} y={y} state={pin.state} active={pin.id === active} hollow={hidden} />
            </g>
          );
        })}
      </svg>
      {pins.map(({ pin, x, y, hidden }) =>
        x < 0 || y < 0 || x > width || y > height ? null : (
          <button
            key={pin.id}
            type="button"
            aria-pressed={pin.id === active}
            aria-label={`${STATE_WORDS[pin.state]}: ${pin.label}${hidden ? ', behind the template' : ''}`}
            onClick={() => onSelect?.(pin.id)}
            style={{ left: x - 14, top: y - 14 }}
            className="absolute size-7 bg-transparent"
          />
        ),
      )}
    </>
  );
}

function PinMark(props: { x: number; y: number; state: PinState; active: boolean; hollow: boolean }) {
  const { x, y, state, active, hollow } = props;
  const half = active ? 5 : 3.5;
  const solid = state === 'must-settle' && !hollow;
  return (
    <>
      <rect
        x={x - half}
        y={y - half}
        width={half * 2}
        height={half * 2}
        className={clsx('stroke-current', solid ? 'fill-current' : 'fill-sheet')}
        strokeWidth="1.4"
        strokeDasharray={hollow ? '2 2' : undefined}
      />
      {state === 'look' ? (
        <rect x={x - 1.2} y={y - 1.2} width="2.4" height="2.4" className="fill-current" />
      ) : null}
      {state === 'settled' ? (
        <path d={`M${x - half} ${y + half}L${x + half} ${y - half}`} className="stroke-current" />
      ) : null}
    </>
  );
}

function clip(label: string): string {
  return label.length <= MOST_CHARACTERS ? label : `${label.slice(0, MOST_CHARACTERS - 1).trimEnd()}…`;
}
