'use client';

import clsx from 'clsx';
import { useCallback, useEffect, useMemo, useState } from 'react';
import { ToggleButton, ToggleButtonGroup } from 'react-aria-components';
import { cutSheet } from '@/lib/stage-model/cut-sheet';
import { findSectionWalls, type SectionWall } from '@/lib/stage-model/find-section-walls';
import { meetSection } from '@/lib/stage-model/meet-section';
import { openSection } from '@/lib/stage-model/open-section';
import { cutSection, type SectionLine } from '@/lib/stage-model/section';
import type { SheetModelMeta } from '@/lib/stage-model/sheet-model-meta';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';
import { formatLength } from '../format-figure';
import { NumberField } from '../number-field';
import { usePreferences } from '../preferences-context';
import { mainWalls, scaleProfile } from './layout-profile';
import { ProfileDrawing, type StripVent } from './profile-drawing';
import type { Point } from './stage-props';
import { SHEET_DIGITS } from './map-words';
import { useSheetModel } from './use-sheet-model';
import { useStageModel } from './use-stage-model';
import { WallTable } from './wall-table';

export interface ProfileStripProps {
  /** what is cut, for the drawing's accessible name */
  title: string;
  modelUrl: string;
  meta: StageModelMeta;
  sectionLine: SectionLine;
  onSectionLineChange: (line: SectionLine) => void;
  /** who put the line there; one that nobody moved by hand is shifted to where it meets the template */
  cutBy?: 'opening' | 'place' | 'hand';
  limitDeg: number;
  /** the formed sheet, drawn over the template; null where none was formed */
  sheet?: { url: string; meta: SheetModelMeta } | null;
  /** least thickness wanted of it */
  sheetMm?: number | null;
  vents?: readonly StripVent[];
  /** a wall was chosen: its middle, mm, and its draft */
  onWallSelect?: (at: Point, draftDeg: number) => void;
  className?: string;
}

/** The section through the template along the cutting line, cut from the very model that the stage shows. */
export function ProfileStrip(props: ProfileStripProps) {
  const {
    title,
    modelUrl,
    meta,
    sectionLine,
    onSectionLineChange,
    limitDeg,
    vents = [],
    onWallSelect,
    cutBy = 'hand',
  } = props;
  const { units } = usePreferences();
  const { model, problem } = useStageModel(modelUrl);
  const formed = useSheetModel(props.sheet, model);
  const [exaggerated, setExaggerated] = useState(false);
  const [frame, widthPx] = useWidth();
  const { axis, atMm } = sectionLine;
  const section = useMemo(() => (model ? cutSection(model, { axis, atMm }) : null), [model, axis, atMm]);
  const sheetRuns = useMemo(() => (formed ? cutSheet(formed, { axis, atMm }) : []), [formed, axis, atMm]);
  const { min, max } = meta.boundsMm;
  const high = max[2];
  const walls = useMemo(() => (section ? mainWalls(findSectionWalls(section), high) : []), [section, high]);
  const [chosen, setChosen] = useState<SectionWall | null>(null);
  const active = chosen && walls.includes(chosen) ? chosen : null;

  const [across, along] = axis === 'y' ? [1, 0] : [0, 1];
  const limits: [number, number] = [min[across], max[across]];
  const scale = widthPx > 0 ? scaleProfile({ from: min[along], to: max[along], high, widthPx }) : null;
  const move = (at: number | null) => {
    if (at !== null) onSectionLineChange({ axis, atMm: Math.min(limits[1], Math.max(limits[0], at)) });
  };
  const turnTo = (next: 'x' | 'y') => {
    const other = next === 'y' ? 1 : 0;
    onSectionLineChange({ axis: next, atMm: Math.round(((min[other] + max[other]) / 2) * 10) / 10 });
  };
  const choose = (wall: SectionWall) => {
    setChosen(wall);
    const [u, z] = [(wall.from[0] + wall.to[0]) / 2, (wall.from[1] + wall.to[1]) / 2];
    onWallSelect?.(axis === 'y' ? [u, atMm, z] : [atMm, u, z], wall.draftDeg);
  };
  const [low, top] = limits;
  useEffect(() => {
    if (!model || cutBy === 'hand') return;
    const line = { axis, atMm };
    const opening = cutBy === 'opening' ? openSection(model, line, [low, top]) : null;
    const met = opening ?? meetSection(model, line, [low, top]);
    if (met && met.atMm !== atMm) onSectionLineChange(met);
  }, [model, cutBy, axis, atMm, low, top, onSectionLineChange]);
  const side = axis === 'y' ? 'front' : 'right';
  const broken = walls.filter((wall) => wall.draftDeg < limitDeg).length;
  const open = section?.loops.some((loop) => !loop.closed) ?? false;

  return (
    <section aria-label="Section A–A" className={clsx('border border-rule bg-sheet', props.className)}>
      <div className="flex flex-wrap items-center gap-x-4 gap-y-1 px-3 pt-2 sm:px-4">
        <p className="text-sm font-semibold">Section A–A</p>
        <p className="text-xs text-slate max-sm:hidden">seen from the {side}</p>
        {props.sheet ? (
          <ToggleButton
            isSelected={exaggerated}
            onChange={setExaggerated}
            isDisabled={!formed}
            className="border-b-2 border-transparent py-1 text-xs text-slate data-hovered:text-ink data-selected:border-ink data-selected:text-ink pointer-coarse:py-2.5"
          >
            Sheet {EXAGGERATED} times as thick
          </ToggleButton>
        ) : null}
        <div className="flex grow flex-wrap items-center gap-x-3 gap-y-1 sm:justify-end">
          <ToggleButtonGroup
            aria-label="Cut at a fixed"
            selectionMode="single"
            disallowEmptySelection
            selectedKeys={[axis]}
            onSelectionChange={([next]) => next && next !== axis && turnTo(next as 'x' | 'y')}
            className="flex font-mono text-sm"
          >
            {(['y', 'x'] as const).map((id) => (
              <ToggleButton
                key={id}
                id={id}
                aria-label={id === 'y' ? 'y: cut from left to right' : 'x: cut from front to back'}
                className="min-w-8 border-b-2 border-transparent px-2 py-1 text-slate data-hovered:text-ink data-selected:border-ink data-selected:text-ink pointer-coarse:py-2.5"
              >
                {id}
              </ToggleButton>
            ))}
          </ToggleButtonGroup>
          <input
            type="range"
            aria-label={`Cutting line, ${axis} in mm`}
            aria-valuetext={`${axis} = ${formatLength(atMm, units, 1)}`}
            min={Math.ceil(limits[0] * 2) / 2}
            max={Math.floor(limits[1] * 2) / 2}
            step={0.5}
            value={atMm}
            onChange={(event) => move(Number(event.target.value))}
            className="h-6 min-w-24 flex-1 accent-verdigris sm:max-w-44 pointer-coarse:h-11"
          />
          <NumberField
            label={`Cutting line, ${axis}`}
            hideLabel
            unit="mm"
            value={atMm}
            min={Math.round(limits[0] * 10) / 10}
            max={Math.round(limits[1] * 10) / 10}
            step={0.5}
            onChange={move}
            className="w-28"
          />
        </div>
      </div>
      <div ref={frame} className={clsx('overflow-hidden pb-2', !section && 'min-h-64')}>
        {problem ? <p className="p-4 text-sm text-madder">{problem}</p> : null}
        {!problem && !section ? <p className="p-4 text-sm text-slate">The model is on its way.</p> : null}
        {section && scale ? (
          <ProfileDrawing
            section={section}
            walls={walls}
            scale={scale}
            widthPx={widthPx}
            limitDeg={limitDeg}
            units={units}
            vents={vents}
            sheet={
              sheetRuns.length > 0
                ? { runs: sheetRuns, times: exaggerated ? EXAGGERATED : 1, wantedMm: props.sheetMm ?? null }
                : null
            }
            active={active}
            onWall={choose}
            label={
              section.boundsMm
                ? `Section of ${title} at ${axis} = ${formatLength(atMm, units, 1)}, seen from the ${side}: ` +
                  `${formatLength(section.boundsMm.to - section.boundsMm.from, units, 1)} wide, ` +
                  `${formatLength(section.boundsMm.high, units, 1)} high, ${walls.length} main walls, ` +
                  `${broken} below ${Number(limitDeg.toFixed(1))}° of draft.`
                : `The cutting line at ${axis} = ${formatLength(atMm, units, 1)} misses the template.`
            }
          />
        ) : null}
        {section && !section.boundsMm && cutBy === 'hand' ? (
          <p className="px-4 text-sm text-slate">The line misses the template.</p>
        ) : null}
      </div>
      {sheetRuns.length > 0 && section?.boundsMm ? (
        <p className="px-3 pb-2 text-xs text-slate sm:px-4">
          {sheetWordsAlong(
            sheetRuns.flatMap(({ thicknessMm }) => thicknessMm),
            { wantedMm: props.sheetMm ?? null, times: exaggerated ? EXAGGERATED : 1 },
            (mm) => formatLength(mm, units, SHEET_DIGITS),
          )}
        </p>
      ) : null}
      {open ? (
        <p className="px-4 pb-2 text-xs text-ochre-ink">
          The mesh is open along this cut; the outline ends where the mesh does.
        </p>
      ) : null}
      {walls.length > 0 ? (
        <WallTable
          walls={walls}
          axis={axis}
          limitDeg={limitDeg}
          units={units}
          active={active}
          onWall={choose}
        />
      ) : null}
    </section>
  );
}

/** How many times as thick the sheet is drawn on request. */
const EXAGGERATED = 5;

function sheetWordsAlong(
  thicknessMm: readonly number[],
  { wantedMm, times }: { wantedMm: number | null; times: number },
  say: (mm: number) => string,
): string {
  const [low, high] = [Math.min(...thicknessMm), Math.max(...thicknessMm)];
  const drawn = times === 1 ? 'drawn to scale' : `drawn ${times} times as thick`;
  const thin =
    wantedMm !== null && low < wantedMm ? ` Red where it is below the ${say(wantedMm)} wanted.` : '';
  return `Formed sheet, an estimate: ${say(low)} to ${say(high)} along this cut, ${drawn}.${thin}`;
}

function useWidth(): [(element: HTMLDivElement | null) => (() => void) | undefined, number] {
  const [width, setWidth] = useState(0);
  const ref = useCallback((element: HTMLDivElement | null) => {
    if (!element) return undefined;
    const observer = new ResizeObserver(([entry]) => setWidth(Math.round(entry.contentRect.width)));
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}
