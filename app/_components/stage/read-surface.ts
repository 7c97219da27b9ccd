import { LAYERS_FROM_DEG, LAYERS_TO_DEG, TRAP_FROM_MM } from '@/lib/stage-model/shown-range';
import { FLAT_FROM_DEG } from '@/lib/stage-model/draft-scale';
import type { StageLimits } from '@/lib/stage-model/map-scale';
import { formatLength, formatNumber } from '../format-figure';
import type { Units } from '../preferences';
import { DEPTH_DIGITS, SHEET_DIGITS, STEP_DIGITS, WALL_DIGITS } from './map-words';
import type { StageMap } from './stage-maps';
import type { SurfaceHit } from './surface-picker';

/** The figure of the map at a place, as the scale has it; null where the map says nothing of it. */
export function figureAt(hit: SurfaceHit, map: StageMap, { layerMm }: StageLimits): number | null {
  if (hit.bed) return null;
  if (map === 'draft') return hit.draftDeg;
  if (map === 'layers') return layerMm === null ? null : stepAt(hit.draftDeg, layerMm);
  if (map === 'wall') return hit.wallMm;
  if (map === 'sheet') return hit.sheetMm;
  if (map === 'trap') return hit.trapMm !== null && hit.trapMm > TRAP_FROM_MM ? hit.trapMm : null;
  return null;
}

/** A place on the surface in words: the figure of the map against its limit, and where it is. */
export function readSurface(hit: SurfaceHit, map: StageMap, limits: StageLimits, units: Units): string {
  const [x, y, z] = hit.at.map((v) => formatLength(v, units, 1));
  return `${readFigure(hit, map, limits, units)}, at x ${x}, y ${y}, z ${z}`;
}

function readFigure(hit: SurfaceHit, map: StageMap, limits: StageLimits, units: Units): string {
  if (hit.bed) return 'Stands on the bed';
  if (map === 'layers') return readStep(hit, limits, units);
  if (map === 'wall') return readWall(hit, limits, units);
  if (map === 'trap') return readTrap(hit, units);
  if (map === 'sheet') return readSheet(hit, limits, units);
  return readDraft(hit, limits.draftDeg);
}

function readDraft({ draftDeg, undercut }: SurfaceHit, limitDeg: number): string {
  const draft = `Draft ${formatNumber(draftDeg, 1)}°`;
  if (undercut) return `${draft}, undercut`;
  if (draftDeg >= FLAT_FROM_DEG) return `${draft}, flat`;
  return draftDeg < limitDeg ? `${draft}, below the limit of ${Number(limitDeg.toFixed(1))}°` : draft;
}

function readStep({ draftDeg }: SurfaceHit, { layerMm, stepMm }: StageLimits, units: Units): string {
  const step = layerMm === null ? null : stepAt(draftDeg, layerMm);
  if (draftDeg >= LAYERS_TO_DEG) return 'Flat, no step';
  if (step === null) return draftDeg < -LAYERS_FROM_DEG ? 'Looks down, no step told' : 'Upright, no step';
  const say = (mm: number) => formatLength(mm, units, STEP_DIGITS);
  const beyond = stepMm !== null && step > stepMm ? `, above the limit of ${say(stepMm)}` : '';
  return `Step ${say(step)}${beyond}`;
}

function readWall({ wallMm }: SurfaceHit, limits: StageLimits, units: Units): string {
  if (wallMm === null) return 'No wall measured';
  const say = (mm: number) => formatLength(mm, units, WALL_DIGITS);
  const below = limits.wallMm !== null && wallMm < limits.wallMm - 0.005;
  return `Wall ${say(wallMm)}${below ? `, below the limit of ${say(limits.wallMm!)}` : ''}`;
}

function readSheet({ sheetMm }: SurfaceHit, limits: StageLimits, units: Units): string {
  if (sheetMm === null) return 'The sheet does not reach this place';
  const say = (mm: number) => formatLength(mm, units, SHEET_DIGITS);
  const below = limits.sheetMm !== null && sheetMm < limits.sheetMm;
  return `Sheet about ${say(sheetMm)}${below ? `, below the ${say(limits.sheetMm!)} wanted` : ''}`;
}

function readTrap({ trapMm, unvented }: SurfaceHit, units: Units): string {
  if (trapMm === null || trapMm <= TRAP_FROM_MM) return 'No pocket';
  return `${formatLength(trapMm, units, DEPTH_DIGITS)} below the rim${unvented ? ', no vent' : ', vented'}`;
}

function stepAt(draftDeg: number, layerMm: number): number | null {
  if (!(draftDeg > LAYERS_FROM_DEG && draftDeg < LAYERS_TO_DEG)) return null;
  return layerMm * Math.sin((draftDeg * Math.PI) / 180);
}
