import { FLAT_FROM_DEG } from '@/lib/stage-model/draft-scale';
import { formatLength, formatNumber } from '../format-figure';
import type { Units } from '../preferences';
import type { SurfaceHit } from './surface-picker';

/** A place on the surface in words: its draft against the limit, and where it is. */
export function readSurface(hit: SurfaceHit, limitDeg: number, units: Units): string {
  const [x, y, z] = hit.at.map((v) => formatLength(v, units, 1));
  return `${readDraft(hit, limitDeg)}, at x ${x}, y ${y}, z ${z}`;
}

function readDraft({ draftDeg, undercut, bed }: SurfaceHit, limitDeg: number): string {
  if (bed) return 'Stands on the bed';
  const draft = `Draft ${formatNumber(draftDeg, 1)}°`;
  if (undercut) return `${draft}, undercut`;
  if (draftDeg >= FLAT_FROM_DEG) return `${draft}, flat`;
  return draftDeg < limitDeg ? `${draft}, below the limit of ${Number(limitDeg.toFixed(1))}°` : draft;
}
