'use client';

import { useEffect, useMemo, useRef, useState } from 'react';
import { usePeople, useDocket, useRevision } from '../_hooks/use-room-data';
import { useDocketAddress } from '../_hooks/use-docket-filter';
import { useKeysOn, useRoomKeys } from '../_hooks/use-room-keys';
import { useStageFocus } from '../_hooks/use-stage-focus';
import { usePresence } from '@/app/_components/live/use-presence';
import { draftKey } from '@/app/_components/note-editor/note-draft';
import { useDraftKeys } from '@/app/_components/note-editor/use-draft-keys';
import { usePreferences } from '@/app/_components/preferences-context';
import { mapOfCheck, offeredMaps, type StageMap } from '@/app/_components/stage/stage-maps';
import type { Point, StageCamera } from '@/app/_components/stage/stage-props';
import type { SheetModelMeta } from '@/lib/stage-model/sheet-model-meta';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';
import type { DocketView, RevisionView } from '@/lib/review/schemas';
import { AdvicePanel } from './advice-panel';
import { CheckPanel } from './check-panel';
import { Docket } from './docket';
import { byGroup, docketItems, filterItems, groupOrder, type DocketItem } from './docket-items';
import { gateSteps } from './gate-steps';
import { primaryStep } from './primary-step';
import { PostedWith } from './posted-with';
import { PrintedRecord } from './printed-record';
import { PrimaryAction, RoomActions, RoomDialogs, type RoomDialog } from './room-actions';
import { RoomProvider, type RoomReader, type RoomValue } from './room-context';
import { RecipePanel } from './recipe-panel';
import { RoomTitle } from './room-title';
import { stageLimits } from './stage-limits';
import { StagePanel } from './stage-panel';
import { isExactPlace, itemOfPin, placeOf, stagePins } from './stage-pins';
import { StateBanner } from './state-banner';
import { revisionApi } from '../_hooks/use-room-data';

export interface RoomProps {
  workspace: RoomValue['workspace'];
  reader: RoomReader;
  revision: RevisionView;
  docket: DocketView;
  /** When the server read them, in ms. */
  loadedAt: number;
}

/** One revision: identity, gates, model, section and docket, and everything that can be done with it. */
export function Room({
  workspace,
  reader,
  revision: givenRevision,
  docket: givenDocket,
  loadedAt,
}: RoomProps) {
  const { data: revision } = useRevision(workspace.id, givenRevision, loadedAt);
  const { data: docket } = useDocket(workspace.id, givenDocket, loadedAt);
  const people = usePeople(workspace.id);
  usePresence(workspace.id, revision.id);
  const draftKeys = useDraftKeys(reader.id, revision.id);
  const { units } = usePreferences();
  const { filter, item: active, setFilter, setItem } = useDocketAddress();
  const [adding, setAdding] = useState(false);
  const [dialog, setDialog] = useState<RoomDialog | null>(null);
  const filterInput = useRef<HTMLInputElement>(null);

  const [map, setMap] = useState<StageMap>('plain');
  const limits = useMemo(
    () => stageLimits(docket.findings, revision.recipe),
    [docket.findings, revision.recipe],
  );
  const meta = revision.model ? (revision.model.meta as unknown as StageModelMeta) : null;
  const sheetMeta = revision.sheet ? (revision.sheet.meta as unknown as SheetModelMeta) : null;
  const bounds = meta?.boundsMm ?? null;
  const items = docketItems(docket);
  const groups = byGroup(items);
  const focus = useStageFocus(bounds);
  const pins = bounds ? stagePins(items, bounds, units, active) : [];
  const failing = groups.settle.filter(
    (item) => item.finding?.status === 'fail' && !item.finding.waiver,
  ).length;
  const waived = docket.findings.filter((finding) => finding.waiver).length;
  const notRun = docket.findings.filter((finding) => finding.status === 'not-run').length;
  const step = primaryStep(revision, {
    pack: `${revisionApi(workspace.id, revision.id)}/pack`,
    post: `/w/${workspace.slug}/templates/${revision.template.id}/post`,
  });

  const itemOf = (key: string) => items.find((each) => each.key === key);
  /** A finding that a map shows brings that map; a note leaves the one that is on. */
  const showMapOf = (item: DocketItem | undefined) => {
    const wanted = item?.finding ? mapOfCheck(item.finding.checkId) : null;
    if (wanted && meta && offeredMaps(meta, limits, sheetMeta).includes(wanted)) setMap(wanted);
  };
  const activate = (key: string) => {
    setItem(key);
    const item = itemOf(key);
    showMapOf(item);
    const at = item ? placeOf(item) : null;
    const view = (item?.thread?.pin?.view as StageCamera | undefined) ?? null;
    if (item && at) focus.look(at, `${key}#0`, view, isExactPlace(item));
    else focus.clear();
  };
  /** Goes to an item from the keyboard or from the model: marks it and brings it into sight. */
  const visit = (key: string) => {
    activate(key);
    requestAnimationFrame(() => {
      const element = document.getElementById(key);
      element?.focus({ preventScroll: true });
      element?.scrollIntoView({ block: 'nearest' });
    });
  };
  const walk = (by: 1 | -1) => {
    const shown = byGroup(filterItems(items, filter, reader.id));
    const order = groupOrder.flatMap((group) => shown[group]);
    if (order.length === 0) return;
    const at = order.findIndex((item) => item.key === active);
    visit(order[at < 0 ? (by === 1 ? 0 : order.length - 1) : (at + by + order.length) % order.length].key);
  };
  const [keysOn] = useKeysOn();
  useRoomKeys(keysOn, {
    next: () => walk(1),
    previous: () => walk(-1),
    filter: () => filterInput.current?.focus(),
    comment: () => {
      if (revision.can.note) setAdding(true);
    },
  });

  // An address that names an item (from a mail or Today) opens the page at it.
  const arrived = useRef(false);
  useEffect(() => {
    if (arrived.current || !active) return;
    arrived.current = true;
    document.getElementById(active)?.scrollIntoView({ block: 'center' });
  }, [active]);

  const room: RoomValue = {
    workspace,
    reader,
    revision,
    people,
    active,
    activate,
    showPlace: (key, at) => {
      setItem(key);
      const item = itemOf(key);
      showMapOf(item);
      focus.look(at as Point, `${key}#0`, null, item !== undefined && isExactPlace(item));
      document.getElementById('stage')?.scrollIntoView({ block: 'nearest' });
    },
    askForPin: revision.model
      ? (take) => {
          focus.ask(take);
          const stage = document.getElementById('stage');
          stage?.scrollIntoView({ block: 'nearest' });
          // The keys that bring a place to the cross-hair and take it are the stage's.
          stage?.querySelector<HTMLElement>('[role="application"]')?.focus({ preventScroll: true });
        }
      : null,
    placing: focus.placing,
    hasDraft: (subject) => draftKeys.has(draftKey(reader.id, revision.id, subject)),
  };

  return (
    <RoomProvider value={room}>
      <h1 className="sr-only">
        {revision.template.number} revision {revision.letter}, {revision.template.title}
      </h1>
      <div className="flex flex-col gap-4">
        <RoomTitle
          revision={revision}
          gates={gateSteps(revision, { failing, waived, notRun }, groups.settle.length)}
          action={
            step ? (
              <PrimaryAction
                step={step}
                onOpen={setDialog}
                onSettle={() => {
                  setFilter({ search: '', kind: 'all' });
                  if (groups.settle[0]) visit(groups.settle[0].key);
                }}
              />
            ) : null
          }
        />
        <div className="flex flex-wrap items-start justify-between gap-x-6 gap-y-2">
          <PostedWith revision={revision} />
          <RoomActions step={step} onOpen={setDialog} />
        </div>
        <StateBanner revision={revision} />
        <CheckPanel revision={revision} />
        <RecipePanel recipe={revision.recipe} />
        <AdvicePanel check={revision.check} />
        <div className="grid items-start gap-6 print:block lg:grid-cols-[minmax(0,1fr)_minmax(20rem,27rem)]">
          <div
            id="stage"
            className="min-w-0 scroll-mt-4 break-inside-avoid print:mb-6 print:[&_[role=radiogroup]]:hidden print:[&_[role=toolbar]]:hidden [@media(min-width:64rem)_and_(min-height:50rem)]:sticky [@media(min-width:64rem)_and_(min-height:50rem)]:top-3"
          >
            <h2 className="sr-only">Model and section</h2>
            <StagePanel
              revision={revision}
              limits={limits}
              map={map}
              onMapChange={setMap}
              pins={pins}
              activePin={focus.activePin}
              onPinSelect={(id) => visit(itemOfPin(id))}
              placing={focus.placing}
              onPlace={focus.place}
              onPlaceCancel={focus.cancel}
              view={focus.view}
              highlight={focus.highlight}
              line={focus.line}
              cutBy={focus.cutBy}
              onWallSelect={focus.point}
              onLineChange={focus.setLine}
            />
          </div>
          <Docket
            items={items}
            filter={filter}
            onFilter={setFilter}
            filterRef={filterInput}
            adding={adding}
            onAdding={setAdding}
          />
        </div>
        <PrintedRecord revision={revision} />
      </div>
      <RoomDialogs open={dialog} onClose={() => setDialog(null)} />
    </RoomProvider>
  );
}
