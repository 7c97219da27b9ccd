import {
  draftMapScale,
  layerMapScale,
  sheetMapScale,
  trapMapScale,
  wallMapScale,
  type MapScale,
  type StageLimits,
} from '@/lib/stage-model/map-scale';
import type { SheetModelMeta } from '@/lib/stage-model/sheet-model-meta';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';

export type StageMap = 'plain' | 'draft' | 'undercut' | 'layers' | 'wall' | 'trap' | 'sheet';

/** In the order of the choice; the words in the stage's own name. */
export const STAGE_MAPS: readonly { id: StageMap; label: string; words: string }[] = [
  { id: 'plain', label: 'Plain', words: 'plain' },
  { id: 'draft', label: 'Draft', words: 'draft map' },
  { id: 'undercut', label: 'Undercut', words: 'undercut map' },
  { id: 'layers', label: 'Layer lines', words: 'map of layer lines' },
  { id: 'wall', label: 'Wall', words: 'map of wall thickness' },
  { id: 'trap', label: 'Trapped air', words: 'map of trapped air' },
  { id: 'sheet', label: 'Formed sheet', words: 'map of the formed sheet’s thickness' },
];

/**
 * The maps that this model can show: older models carry no walls and pockets, a recipe may name no layer, and a revision
 * checked before sheets were formed has none.
 */
export function offeredMaps(
  { maps }: StageModelMeta,
  { layerMm }: Pick<StageLimits, 'layerMm'>,
  sheet: SheetModelMeta | null,
): StageMap[] {
  const has: Record<StageMap, boolean> = {
    plain: true,
    draft: true,
    undercut: true,
    layers: layerMm !== null,
    wall: maps?.wall !== undefined,
    trap: maps?.trap !== undefined,
    sheet: sheet !== null,
  };
  return STAGE_MAPS.map(({ id }) => id).filter((id) => has[id]);
}

const OF_CHECK: Record<string, StageMap> = {
  draft: 'draft',
  undercut: 'undercut',
  layers: 'layers',
  shell: 'wall',
  walls: 'wall',
  air: 'trap',
  vents: 'trap',
  sheet: 'sheet',
};

/** The map that shows what a check is about, where there is one. */
export function mapOfCheck(checkId: string): StageMap | null {
  return OF_CHECK[checkId] ?? null;
}

/** The colour scale of a map; null where it has none (plain and undercut). */
export function scaleOfMap(
  map: StageMap,
  { maps }: StageModelMeta,
  limits: StageLimits,
  sheet: SheetModelMeta | null,
): MapScale | null {
  if (map === 'sheet') return sheet && sheetMapScale(sheet.gaugeMm, limits);
  if (map === 'draft') return draftMapScale(limits);
  if (map === 'layers' && limits.layerMm !== null) return layerMapScale(limits.layerMm, limits);
  if (map === 'wall') return wallMapScale(limits);
  return map === 'trap' && maps ? trapMapScale(maps) : null;
}
