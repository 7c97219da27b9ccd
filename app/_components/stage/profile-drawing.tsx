'use client';

import clsx from 'clsx';
import { useId } from 'react';
import type { Section } from '@/lib/stage-model/section';
import type { SheetRun } from '@/lib/stage-model/cut-sheet';
import type { SectionWall } from '@/lib/stage-model/find-section-walls';
import { formatLength } from '../format-figure';
import type { Units } from '../preferences';
import {
  layoutWallLabels,
  profilePath,
  scaleBarMm,
  sheetPath,
  thinSheetPath,
  type ProfileScale,
} from './layout-profile';

/** A vent that the cut may meet: where it comes out on the bed, and how wide it is. */
export interface StripVent {
  at: [number, number, number];
  diameterMm: number;
}

export interface ProfileDrawingProps {
  section: Section;
  walls: readonly SectionWall[];
  scale: ProfileScale;
  widthPx: number;
  limitDeg: number;
  units: Units;
  vents: readonly StripVent[];
  /** the formed sheet along the cut, how many times as thick it is drawn, and what is wanted of it */
  sheet: { runs: readonly SheetRun[]; times: number; wantedMm: number | null } | null;
  active: SectionWall | null;
  onWall: (wall: SectionWall) => void;
  label: string;
}

const FIGURE = 'fill-current font-mono text-[11px]';

/** The cut as a drawing: hatched solid, outline, bed, drafts, sizes, scale bar; what is below the limit is thick. */
export function ProfileDrawing(props: ProfileDrawingProps) {
  const { section, walls, scale, widthPx, limitDeg, units, sheet, active, onWall } = props;
  const hatch = useId();
  const path = profilePath(section, scale);
  const labels = layoutWallLabels(walls, limitDeg, scale, widthPx);
  return (
    <svg
      viewBox={`0 0 ${widthPx} ${scale.heightPx}`}
      width={widthPx}
      height={scale.heightPx}
      role="img"
      aria-label={props.label}
      className="block max-w-full text-ink"
    >
      <defs>
        <pattern id={hatch} width="7" height="7" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <path d="M0 0V7" className="stroke-slate" strokeWidth="0.8" strokeOpacity="0.75" />
        </pattern>
      </defs>
      <path
        d={path}
        fill={`url(#${hatch})`}
        className="stroke-ink"
        strokeWidth="1.4"
        strokeLinejoin="round"
      />
      <BedLine scale={scale} section={section} />
      {sheet?.runs.map((run, i) => (
        <g key={i}>
          <path
            d={sheetPath(run, sheet.times, scale)}
            className="fill-verdigris stroke-verdigris"
            strokeWidth="0.6"
            strokeLinejoin="round"
          />
          {sheet.wantedMm === null ? null : (
            <path
              d={thinSheetPath(run, sheet.times, sheet.wantedMm, scale)}
              className="fill-none stroke-madder"
              strokeWidth="2.6"
            />
          )}
        </g>
      ))}
      {walls.map((wall, i) => {
        const d = `M${scale.x(wall.from[0])} ${scale.y(wall.from[1])}L${scale.x(wall.to[0])} ${scale.y(wall.to[1])}`;
        return (
          <g key={i} onClick={() => onWall(wall)} className="cursor-pointer">
            {wall.draftDeg < limitDeg ? <path d={d} className="stroke-madder" strokeWidth="3" /> : null}
            {wall === active ? <path d={d} className="stroke-verdigris" strokeWidth="4" /> : null}
            <path d={d} className="stroke-transparent" strokeWidth="16" />
          </g>
        );
      })}
      {labels.map(({ wall, text, broken, foot, elbow, end }, i) => (
        <g
          key={i}
          onClick={() => onWall(wall)}
          className={clsx('cursor-pointer', broken ? 'text-madder' : 'text-ink')}
        >
          <path d={`M${foot}L${elbow}H${end}`} className="fill-none stroke-current" strokeWidth="0.9" />
          <circle cx={foot[0]} cy={foot[1]} r="1.7" className="fill-current" />
          <text x={Math.min(elbow[0], end)} y={elbow[1] - 5} className={FIGURE}>
            {text}
          </text>
        </g>
      ))}
      <Vents {...props} />
      <Dimensions section={section} scale={scale} units={units} widthPx={widthPx} />
    </svg>
  );
}

function BedLine({ section, scale }: { section: Section; scale: ProfileScale }) {
  const bounds = section.boundsMm;
  if (!bounds) return null;
  const [a, b] = [scale.x(bounds.from) - 22, scale.x(bounds.to) + 22];
  return <path d={`M${a} ${scale.bedY}H${b}`} className="stroke-ink" strokeWidth="1.8" />;
}

/** Vents that the cut passes through; where it does, the drawing shows the gap, and the words tell what it is. */
function Vents({ vents, section, scale, units, widthPx }: ProfileDrawingProps) {
  const { axis, atMm } = section.line;
  const met = vents.filter(
    ({ at, diameterMm }) => Math.abs(at[axis === 'y' ? 1 : 0] - atMm) < diameterMm / 2,
  );
  let free = 0;
  return met
    .map((vent) => ({
      x: scale.x(vent.at[axis === 'y' ? 0 : 1]),
      text: `vent ${formatLength(vent.diameterMm, units, 1)}`,
    }))
    .sort((a, b) => a.x - b.x)
    .map(({ x, text }, i) => {
      const length = text.length * 6.9;
      if (x < free || x + 12 + length > widthPx) return null;
      free = x + 24 + length;
      return (
        <g key={i}>
          <path
            d={`M${x} ${scale.bedY + 2}V${scale.bedY + 15}H${x + 10}`}
            className="fill-none stroke-ink"
            strokeWidth="0.9"
          />
          <text x={x + 13} y={scale.bedY + 19} className={FIGURE}>
            {text}
          </text>
        </g>
      );
    });
}

/** Width and height over all, with extension lines, and the scale bar. */
function Dimensions(props: { section: Section; scale: ProfileScale; units: Units; widthPx: number }) {
  const { section, scale, units, widthPx } = props;
  const bounds = section.boundsMm;
  if (!bounds) return null;
  const [x0, x1] = [scale.x(bounds.from), scale.x(bounds.to)];
  const [y0, y1] = [scale.bedY, scale.y(bounds.high)];
  const widthY = scale.bedY + 34;
  const heightX = Math.min(x1 + 18, widthPx - 12);
  const bar = scaleBarMm(scale.pxPerMm, widthPx);
  const barY = scale.heightPx - 6;
  const width = formatLength(bounds.to - bounds.from, units, 1);
  const gap = (width.length * 6.9) / 2 + 5;
  const middle = (x0 + x1) / 2;
  return (
    <g className="fill-none stroke-slate text-ink" strokeWidth="0.8">
      <path d={`M${x0} ${y0 + 4}V${widthY + 4}M${x1} ${y0 + 4}V${widthY + 4}`} />
      <path d={`M${x0} ${widthY}H${middle - gap}M${middle + gap} ${widthY}H${x1}`} />
      <path d={tick(x0, widthY) + tick(x1, widthY)} className="stroke-ink" strokeWidth="1.2" />
      <text x={middle} y={widthY + 4} textAnchor="middle" className={FIGURE} stroke="none">
        {width}
      </text>
      {y0 - y1 > 26 ? (
        <>
          <path
            d={`M${Math.min(x1, heightX) - 2} ${y1}H${heightX + 4}M${heightX} ${y0}V${y1}`}
            strokeDasharray="none"
          />
          <path d={tick(heightX, y0) + tick(heightX, y1)} className="stroke-ink" strokeWidth="1.2" />
          <text
            x={heightX - 4}
            y={(y0 + y1) / 2}
            transform={`rotate(-90 ${heightX - 4} ${(y0 + y1) / 2})`}
            textAnchor="middle"
            className={clsx(FIGURE, 'stroke-sheet')}
            strokeWidth="3"
            paintOrder="stroke"
          >
            {formatLength(bounds.high, units, 1)}
          </text>
        </>
      ) : null}
      <path
        d={`M14 ${barY - 4}V${barY}H${14 + bar * scale.pxPerMm}V${barY - 4}`}
        className="stroke-ink"
        strokeWidth="1.2"
      />
      <text x={20 + bar * scale.pxPerMm} y={barY + 1} className={FIGURE} stroke="none">
        {formatLength(bar, units, bar < 1 ? 1 : 0)}
      </text>
    </g>
  );
}

/** The short stroke across the end of a dimension line. */
function tick(x: number, y: number): string {
  return `M${x - 3.5} ${y + 3.5}L${x + 3.5} ${y - 3.5}`;
}
