'use client';

import dynamic from 'next/dynamic';
import { useSyncExternalStore } from 'react';
import { SkeletonBlock } from '@/app/_components/skeleton';
import { Stage } from '@/app/_components/stage/stage';
import type { StageMap } from '@/app/_components/stage/stage-maps';
import type { Point, StageCamera, StagePin } from '@/app/_components/stage/stage-props';
import { usePreferences } from '@/app/_components/preferences-context';
import type { StageLimits } from '@/lib/stage-model/map-scale';
import type { SectionLine } from '@/lib/stage-model/section';
import type { SheetModelMeta } from '@/lib/stage-model/sheet-model-meta';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';
import type { RevisionView } from '@/lib/review/schemas';
import { useVents } from '../_hooks/use-room-data';
import type { CutBy } from '../_hooks/use-stage-focus';
import { useRoom } from './room-context';

// Cuts the model that the stage has fetched; nothing of it is needed before the model is there.
const ProfileStrip = dynamic(
  () => import('@/app/_components/stage/profile-strip').then((module) => module.ProfileStrip),
  { ssr: false, loading: () => <SkeletonBlock className="h-80" label="The section is on its way" /> },
);

export interface StagePanelProps {
  revision: RevisionView;
  limits: StageLimits;
  map: StageMap;
  onMapChange: (map: StageMap) => void;
  pins: readonly StagePin[];
  activePin: string | null;
  onPinSelect: (id: string) => void;
  placing: boolean;
  onPlace: (at: Point, normal: Point, view: StageCamera) => void;
  onPlaceCancel: () => void;
  view: StageCamera | null;
  highlight: Point | null;
  line: SectionLine | null;
  cutBy: CutBy;
  /** A wall of the section was chosen. */
  onWallSelect: (at: Point) => void;
  onLineChange: (line: SectionLine) => void;
}

const darkQuery = '(prefers-color-scheme: dark)';
const subscribeDark = (listener: () => void) => {
  const query = window.matchMedia(darkQuery);
  query.addEventListener('change', listener);
  return () => query.removeEventListener('change', listener);
};

/** The theme that is on the screen, with `system` resolved. */
function useShownTheme(): 'light' | 'dark' {
  const { theme } = usePreferences();
  const systemDark = useSyncExternalStore(
    subscribeDark,
    () => window.matchMedia(darkQuery).matches,
    () => false,
  );
  if (theme === 'system') return systemDark ? 'dark' : 'light';
  return theme;
}

/** The model with its maps and pins, and the section under it. */
export function StagePanel(props: StagePanelProps) {
  const { revision, limits, map, onMapChange } = props;
  const theme = useShownTheme();
  const { workspace } = useRoom();
  const vents = useVents(workspace.id, revision);
  const title = `${revision.template.title}, revision ${revision.letter}`;
  if (!revision.model) {
    const waiting = revision.check.state === 'queued' || revision.check.state === 'running';
    return (
      <div className="border border-rule bg-sheet">
        {waiting ? (
          <SkeletonBlock className="h-80 lg:h-[30rem]" label="The model is being made for this page" />
        ) : (
          <p className="px-4 py-16 text-center text-base text-slate">
            There is no model of this revision to show.
          </p>
        )}
      </div>
    );
  }
  const meta = revision.model.meta as unknown as StageModelMeta;
  const sheet = revision.sheet as { url: string; meta: unknown } | null as {
    url: string;
    meta: SheetModelMeta;
  } | null;
  return (
    <>
      <Stage
        title={title}
        modelUrl={revision.model.url}
        pictureUrl={revision.model.pictureUrl}
        meta={meta}
        sheet={sheet}
        map={map}
        onMapChange={onMapChange}
        limits={limits}
        pins={props.pins}
        activePin={props.activePin}
        onPinSelect={props.onPinSelect}
        placing={props.placing}
        onPlace={props.onPlace}
        onPlaceCancel={props.onPlaceCancel}
        sectionLine={props.line}
        onSectionLineChange={props.onLineChange}
        view={props.view}
        highlight={props.highlight}
        theme={theme}
      />
      {props.line ? (
        <ProfileStrip
          title={title}
          modelUrl={revision.model.url}
          meta={meta}
          sectionLine={props.line}
          onSectionLineChange={props.onLineChange}
          cutBy={props.cutBy}
          limitDeg={limits.draftDeg}
          sheet={sheet}
          sheetMm={limits.sheetMm}
          vents={vents}
          onWallSelect={(at) => props.onWallSelect(at)}
          className="border-t-0 print:hidden"
        />
      ) : null}
    </>
  );
}
