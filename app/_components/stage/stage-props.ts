import type { StageLimits } from '@/lib/stage-model/map-scale';
import type { SectionLine } from '@/lib/stage-model/section';
import type { SheetModelMeta } from '@/lib/stage-model/sheet-model-meta';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';
import type { StageMap } from './stage-maps';

export type PinState = 'must-settle' | 'look' | 'settled';
export type Point = [number, number, number];

/** Where the eye stands: a parallel view whose shown height follows from the distance. Lengths in mm. */
export interface StageCamera {
  position: Point;
  target: Point;
  up: Point;
}

export interface StagePin {
  id: string;
  /** on the surface, mm */
  at: Point;
  normal: Point;
  state: PinState;
  /** a few words; shown beside the mark and read out */
  label: string;
  /** the view it was placed in; the stage returns to it when the pin becomes active */
  view?: StageCamera | null;
}

export interface StageProps {
  /** what the stage shows, for its accessible name: "Tart tray, six cup, revision C" */
  title: string;
  /** address of the GLB that buildStageModel made */
  modelUrl: string;
  /** address of the picture that renderPicture made; shown while loading and where WebGL is missing */
  pictureUrl: string;
  meta: StageModelMeta;
  /** the formed sheet that buildSheetModel made; null where none was formed */
  sheet?: { url: string; meta: SheetModelMeta } | null;
  map: StageMap;
  onMapChange: (map: StageMap) => void;
  /** what the maps are held against, and hatched beyond */
  limits: StageLimits;
  pins?: readonly StagePin[];
  activePin?: string | null;
  onPinSelect?: (id: string) => void;
  /** while true a press on the model, or Enter at the cross-hair, places a pin */
  placing?: boolean;
  onPlace?: (at: Point, normal: Point, view: StageCamera) => void;
  /** Escape while placing */
  onPlaceCancel?: () => void;
  sectionLine?: SectionLine | null;
  onSectionLineChange?: (line: SectionLine) => void;
  /** a new object moves the eye there */
  view?: StageCamera | null;
  /** when the eye has come to rest */
  onViewChange?: (view: StageCamera) => void;
  /** a place to show, such as the wall chosen in the profile strip */
  highlight?: Point | null;
  /** anything that changes with the theme, so that the stage reads its colours again; else the reader's setting */
  theme?: string;
  className?: string;
}
