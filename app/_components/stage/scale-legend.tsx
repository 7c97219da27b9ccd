'use client';

import clsx from 'clsx';
import { useId, type ReactNode } from 'react';
import { cividisCss } from '@/lib/stage-model/cividis';
import { placeOnScale, STROKES_TURN, type MapScale } from '@/lib/stage-model/map-scale';
import type { MapHistogram } from '@/lib/stage-model/stage-model-meta';

const WIDTH = 280;
const LEFT = 4;
const SPAN = WIDTH - 2 * LEFT;
const BARS = 34;
const BAND = 7;
const LIGHT = '#fefdfa';
const DARK = '#1d2321';

export interface ScaleLegendProps {
  title: string;
  /** unit and whatever the figures are told for */
  caption: string;
  scale: MapScale;
  /** area by figure over the scale; null where nobody counted it */
  histogram: MapHistogram | null;
  /** a figure to mark */
  reading: number | null;
  /** a figure in the reader's unit, without the unit */
  format: (figure: number) => string;
  /** words for somebody who does not see the scale */
  description: string;
  /** the scale hatched all along, where no limit says what is broken */
  hatchAll?: boolean;
  children: ReactNode;
}

/** The scale of a map: area over it, the limit, what is hatched, and the place of a reading. */
export function ScaleLegend(props: ScaleLegendProps) {
  const { title, caption, scale, histogram, reading, format, description, hatchAll = false } = props;
  const { max, limit, dark } = scale;
  const at = (figure: number) => LEFT + placeOnScale(figure, scale) * SPAN;
  const id = useId();
  const [from, to] = hatchAll
    ? [0, max]
    : limit === null
      ? [0, 0]
      : dark === 'low'
        ? [0, limit]
        : [limit, max];
  return (
    <figure className="w-full max-w-80 bg-sheet/85">
      <figcaption className="flex items-baseline justify-between gap-3 text-xs">
        <span className="font-semibold">{title}</span>
        <span className="text-right text-slate">{caption}</span>
      </figcaption>
      <svg
        viewBox={`0 0 ${WIDTH} ${BARS + BAND + 18}`}
        role="img"
        aria-label={description}
        className="mt-0.5 block w-full overflow-visible"
      >
        <defs>
          <linearGradient id={`${id}-scale`} gradientUnits="userSpaceOnUse" x1={LEFT} x2={LEFT + SPAN}>
            {Array.from({ length: 33 }, (_, i) => (
              <stop key={i} offset={i / 32} stopColor={cividisCss(dark === 'high' ? 1 - i / 32 : i / 32)} />
            ))}
          </linearGradient>
          {[LIGHT, DARK].map((colour) => (
            <pattern
              key={colour}
              id={`${id}-${colour === LIGHT ? 'light' : 'dark'}`}
              width="4"
              height="4"
              patternUnits="userSpaceOnUse"
              patternTransform="rotate(45)"
            >
              <rect width="1.3" height="4" fill={colour} />
            </pattern>
          ))}
        </defs>
        {histogram ? (
          <path
            d={histogramPath(histogram, max)}
            fill={`url(#${id}-scale)`}
            className="stroke-edge"
            strokeWidth="0.5"
          />
        ) : null}
        <rect x={LEFT} y={BARS + 1} width={SPAN} height={BAND} fill={`url(#${id}-scale)`} />
        {to > from ? <Hatch id={id} from={from} to={to} scale={scale} at={at} /> : null}
        {limit === null ? null : (
          <path d={`M${at(limit)} 2V${BARS + BAND + 3}`} className="stroke-madder" strokeWidth="1.2" />
        )}
        {reading === null ? null : (
          <path
            d={`M${at(reading)} ${BARS - 1}l-3.5 -6h7Z`}
            className="fill-ink stroke-sheet"
            strokeWidth="0.8"
          />
        )}
        {ticksOf(scale).map((figure) => (
          <text
            key={figure}
            x={at(figure)}
            y={BARS + BAND + 14}
            textAnchor={figure === 0 ? 'start' : figure === max ? 'end' : 'middle'}
            className={clsx('font-mono text-[10px]', figure === limit ? 'fill-madder' : 'fill-slate')}
          >
            {figure === max && figure !== limit && dark === 'low' && !scale.closed
              ? `${format(figure)}+`
              : format(figure)}
          </text>
        ))}
      </svg>
      <p className="text-xs text-slate">{props.children}</p>
    </figure>
  );
}

/** Strokes stand out from the colour under them: light ones on its dark half, dark ones on its light half. */
function Hatch(props: {
  id: string;
  from: number;
  to: number;
  scale: MapScale;
  at: (figure: number) => number;
}) {
  const { id, from, to, scale, at } = props;
  const turn = scale.max * (scale.dark === 'low' ? STROKES_TURN : 1 - STROKES_TURN);
  const middle = Math.min(to, Math.max(from, turn));
  const parts = [
    [from, middle, scale.dark === 'low' ? 'light' : 'dark'],
    [middle, to, scale.dark === 'low' ? 'dark' : 'light'],
  ] as const;
  return parts
    .filter(([a, b]) => b > a)
    .map(([a, b, name]) => (
      <rect
        key={name}
        x={at(a)}
        y={BARS + 1}
        width={at(b) - at(a)}
        height={BAND}
        fill={`url(#${id}-${name})`}
      />
    ));
}

/** Ends, thirds and the limit; where the limit's figure would run into another, that one is left out. */
export function ticksOf({ max, limit }: Pick<MapScale, 'max' | 'limit'>): number[] {
  const marked = limit === null || limit > max ? [] : [limit];
  const even = [0, max / 3, (2 * max) / 3, max].filter((f) => marked.every((m) => Math.abs(f - m) > max / 9));
  return [...even, ...marked].sort((a, b) => a - b);
}

/** Steps of area per unit over the scale; what lies beyond its end is left to the words. */
function histogramPath({ edges, areaMm2 }: MapHistogram, max: number): string {
  const bins = areaMm2
    .map((area, i) => ({ from: edges[i], to: edges[i + 1], area }))
    .filter(({ from, to }) => to > 0 && from < max && from >= 0)
    .map((bin) => ({ ...bin, density: bin.area / (bin.to - bin.from) }));
  const top = Math.max(1e-9, ...bins.map((b) => b.density));
  // Square root: a narrow bin of a plane wall must not flatten all others out of sight.
  const height = (density: number) => BARS - Math.sqrt(density / top) * (BARS - 4);
  const x = (figure: number) => LEFT + (Math.min(max, figure) / max) * SPAN;
  const steps = bins.map((b) => `L${x(b.from)} ${height(b.density)}L${x(b.to)} ${height(b.density)}`);
  const [first, last] = [x(bins[0]?.from ?? 0), x(bins.at(-1)?.to ?? 0)];
  return `M${first} ${BARS}${steps.join('')}L${last} ${BARS}Z`;
}
