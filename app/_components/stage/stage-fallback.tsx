'use client';

import clsx from 'clsx';
import type { ReactNode } from 'react';
import type { StageLimits } from '@/lib/stage-model/map-scale';
import type { SheetModelMeta } from '@/lib/stage-model/sheet-model-meta';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';
import { formatLength } from '../format-figure';
import type { Units } from '../preferences';
import { usePreferences } from '../preferences-context';
import { wallAreas } from './draft-legend';
import { formatArea, formatShare } from './format-area';
import { layerWords, sheetWords, trapWords, wallWords, type MapWords } from './map-words';
import type { StagePin } from './stage-props';

const STATES: Record<StagePin['state'], string> = {
  'must-settle': 'must settle',
  look: 'to look at',
  settled: 'settled',
};

/** The stage without 3D: why, the picture, the figures that the maps would show, and the pins as a list. */
export function StageFallback(props: {
  title: string;
  pictureUrl: string;
  meta: StageModelMeta;
  sheet?: { meta: SheetModelMeta } | null;
  limits: StageLimits;
  pins?: readonly StagePin[];
  activePin?: string | null;
  onPinSelect?: (id: string) => void;
  reason: string;
  action?: ReactNode;
  className?: string;
}) {
  const { title, pictureUrl, meta, limits, pins = [], activePin, onPinSelect, reason, action } = props;
  const limitDeg = limits.draftDeg;
  const { units } = usePreferences();
  const { min, max } = meta.boundsMm;
  const { walls, below } = wallAreas(meta, limitDeg);
  const size = [0, 1, 2].map((a) => formatLength(max[a] - min[a], units, 1)).join(' × ');
  const rows: [string, string, boolean?][] = [
    ['Width × depth × height', size],
    [
      'Least draft',
      `${meta.draftRangeDeg[0].toFixed(1).replace('-', '−')}°`,
      meta.draftRangeDeg[0] < limitDeg,
    ],
    ['Area of the walls', formatArea(walls, units)],
    [
      `Walls below ${Number(limitDeg.toFixed(1))}°`,
      `${formatArea(below, units)}, ${formatShare(below, walls)}`,
      below > 0,
    ],
    ['Undercut area', formatArea(meta.areaMm2.undercut, units), meta.areaMm2.undercut > 0],
    ...mapRows(meta, props.sheet?.meta ?? null, limits, units),
    ['Area on the bed', formatArea(meta.areaMm2.bed, units)],
  ];
  return (
    <section
      aria-label={`Picture of ${title}`}
      className={clsx('border border-rule bg-sheet', props.className)}
    >
      <div className="flex flex-wrap items-baseline gap-x-4 gap-y-1 border-b border-rule px-4 py-2.5 text-sm text-slate">
        <p className="min-w-0 flex-1 basis-60">{reason}</p>
        {action}
      </div>
      {/* The picture is already the right size and comes from the store by a signed address. */}
      {/* eslint-disable-next-line @next/next/no-img-element */}
      <img
        src={pictureUrl}
        alt={`${title}, seen from the front right`}
        width={1200}
        height={800}
        className="h-auto max-h-[28rem] w-full bg-[#fefdfa] object-contain"
      />
      <table className="w-full border-t border-rule text-sm">
        <caption className="px-4 pt-3 pb-1 text-left font-semibold">Figures of the check</caption>
        <tbody>
          {rows.map(([name, value, broken]) => (
            <tr key={name} className="border-t border-rule">
              <th scope="row" className="px-4 py-1.5 text-left font-normal text-slate">
                {name}
              </th>
              <td className={clsx('px-4 py-1.5 text-right font-mono', broken && 'text-madder')}>
                {value}
                {broken ? <span className="font-sans"> (outside the limit)</span> : null}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {pins.length > 0 ? (
        <ul aria-label="Pinned places" className="border-t border-rule py-1 text-sm">
          {pins.map((pin) => (
            <li key={pin.id}>
              <button
                type="button"
                aria-pressed={pin.id === activePin}
                onClick={() => onPinSelect?.(pin.id)}
                className="flex w-full flex-wrap gap-x-2 px-4 py-2 text-left hover:bg-sunk aria-pressed:bg-sunk aria-pressed:font-semibold"
              >
                <span>{pin.label}</span>
                <span className="text-slate">
                  {STATES[pin.state]}, at x {formatLength(pin.at[0], units, 1)}, y{' '}
                  {formatLength(pin.at[1], units, 1)}, z {formatLength(pin.at[2], units, 1)}
                </span>
              </button>
            </li>
          ))}
        </ul>
      ) : null}
    </section>
  );
}

/** What the legends of the other maps say, for the maps that this model has. */
function mapRows(
  { maps }: StageModelMeta,
  sheet: SheetModelMeta | null,
  limits: StageLimits,
  units: Units,
): [string, string, boolean][] {
  const row = (name: string, { area, range, broken }: MapWords): [string, string, boolean] => [
    name,
    range ? `${area}${area.endsWith('.') ? '' : '.'} ${range.replace(/\.$/, '')}` : area.replace(/\.$/, ''),
    broken,
  ];
  const { layerMm } = limits;
  return [
    ...(layerMm !== null && maps
      ? [row('Layer lines', layerWords(maps, { ...limits, layerMm }, units))]
      : []),
    ...(maps?.wall ? [row('Wall thickness', wallWords(maps.wall, limits, units))] : []),
    ...(maps?.trap ? [row('Trapped air', trapWords(maps.trap, units))] : []),
    ...(sheet ? [row('Formed sheet', sheetWords(sheet, limits, units))] : []),
  ];
}
