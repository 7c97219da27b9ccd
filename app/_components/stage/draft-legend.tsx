'use client';

import { useId } from 'react';
import { cividisCss } from '@/lib/stage-model/cividis';
import { areaBelowDraft } from '@/lib/stage-model/draft-histogram';
import { draftScaleMaxDeg, FLAT_FROM_DEG } from '@/lib/stage-model/draft-scale';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';
import { usePreferences } from '../preferences-context';
import { formatArea, formatShare } from './format-area';

const WIDTH = 280;
const LEFT = 4;
const SPAN = WIDTH - 2 * LEFT;
const BARS = 34;
const BAND = 7;

/** Area of the walls and of what is below the limit, mm²; faces that look down count as below. */
export function wallAreas({ histogram }: StageModelMeta, limitDeg: number) {
  const walls = areaBelowDraft(histogram, FLAT_FROM_DEG);
  return { walls, below: areaBelowDraft(histogram, Math.min(limitDeg, FLAT_FROM_DEG)) };
}

/** The scale of the draft map with the area of the walls over it, the limit, and the place of a reading. */
export function DraftLegend(props: { meta: StageModelMeta; limitDeg: number; reading: number | null }) {
  const { meta, limitDeg, reading } = props;
  const { units } = usePreferences();
  const max = draftScaleMaxDeg(limitDeg);
  const at = (deg: number) => LEFT + (Math.min(max, Math.max(0, deg)) / max) * SPAN;
  const { walls, below } = wallAreas(meta, limitDeg);
  const limit = Number(limitDeg.toFixed(1));
  const words = `${formatArea(below, units)} of the walls, ${formatShare(below, walls)}, below ${limit}°`;
  const hatch = useId();
  const ticks = tickDegrees(max, limitDeg);
  return (
    <figure className="w-full max-w-80 bg-sheet/85">
      <figcaption className="flex items-baseline justify-between gap-3 text-xs">
        <span className="font-semibold">Draft of the walls</span>
        <span className="text-slate">degrees, by area</span>
      </figcaption>
      <svg
        viewBox={`0 0 ${WIDTH} ${BARS + BAND + 18}`}
        role="img"
        aria-label={`Scale from 0 to ${max} degrees of draft. Limit ${limit} degrees: ${words}.`}
        className="mt-0.5 block w-full overflow-visible"
      >
        <defs>
          <linearGradient id={`${hatch}-scale`}>
            {Array.from({ length: 33 }, (_, i) => (
              <stop key={i} offset={i / 32} stopColor={cividisCss(i / 32)} />
            ))}
          </linearGradient>
          <pattern
            id={hatch}
            width="4"
            height="4"
            patternUnits="userSpaceOnUse"
            patternTransform="rotate(45)"
          >
            <rect width="1.3" height="4" fill="#fefdfa" />
          </pattern>
        </defs>
        <path
          d={histogramPath(meta, max)}
          fill={`url(#${hatch}-scale)`}
          className="stroke-edge"
          strokeWidth="0.5"
        />
        <rect x={LEFT} y={BARS + 1} width={SPAN} height={BAND} fill={`url(#${hatch}-scale)`} />
        <rect x={LEFT} y={BARS + 1} width={at(limitDeg) - LEFT} height={BAND} fill={`url(#${hatch})`} />
        <path d={`M${at(limitDeg)} 2V${BARS + BAND + 3}`} className="stroke-madder" strokeWidth="1.2" />
        {reading === null ? null : (
          <path
            d={`M${at(reading)} ${BARS - 1}l-3.5 -6h7Z`}
            className="fill-ink stroke-sheet"
            strokeWidth="0.8"
          />
        )}
        {ticks.map((deg) => (
          <text
            key={deg}
            x={at(deg)}
            y={BARS + BAND + 14}
            textAnchor={deg === 0 ? 'start' : deg === max ? 'end' : 'middle'}
            className={
              deg === limitDeg ? 'fill-madder font-mono text-[10px]' : 'fill-slate font-mono text-[10px]'
            }
          >
            {deg === max ? `${deg}+` : Number(deg.toFixed(1))}
          </text>
        ))}
      </svg>
      <p className="text-xs text-slate">
        <span className={below > 0 ? 'text-madder' : undefined}>{words}</span>
        {below > 0 ? ', hatched' : ''}
      </p>
    </figure>
  );
}

function tickDegrees(max: number, limit: number): number[] {
  const step = max / 3;
  const even = [0, step, 2 * step, max].filter(
    (deg) => deg === 0 || deg === max || Math.abs(deg - limit) > max / 12,
  );
  return [...new Set([...even, limit])].sort((a, b) => a - b);
}

/** Steps of area per degree over the scale; what lies above its end and below flat is the last step. */
function histogramPath({ histogram }: StageModelMeta, max: number): string {
  const { edgesDeg, areaMm2 } = histogram;
  const bins = areaMm2
    .map((area, i) => ({ from: edgesDeg[i], to: edgesDeg[i + 1], area }))
    .filter(({ from, to }) => to > 0 && from < max && from >= 0)
    .map((bin) => ({ ...bin, density: bin.area / (bin.to - bin.from) }));
  const top = Math.max(1e-9, ...bins.map((b) => b.density));
  // Square root: a narrow bin of a plane wall must not flatten all others out of sight.
  const height = (density: number) => BARS - Math.sqrt(density / top) * (BARS - 4);
  const x = (deg: number) => LEFT + (Math.min(max, deg) / max) * SPAN;
  const steps = bins.map((b) => `L${x(b.from)} ${height(b.density)}L${x(b.to)} ${height(b.density)}`);
  return `M${LEFT} ${BARS}${steps.join('')}L${LEFT + SPAN} ${BARS}Z`;
}
