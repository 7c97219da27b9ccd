'use client';

import clsx from 'clsx';
import { useEffect, useId, useLayoutEffect, useMemo, useRef, useState, type KeyboardEvent } from 'react';
import { cutSection } from '@/lib/stage-model/section';
import { Button } from '../button';
import { usePreferences } from '../preferences-context';
import { describeView, fromCamera } from './camera-rig';
import type { Kept } from './layout-pin-labels';
import { figureAt, readSurface } from './read-surface';
import { readStageColours } from './stage-colours';
import { StageFallback } from './stage-fallback';
import { StageFoot } from './stage-foot';
import { StageMarks } from './stage-marks';
import { sheetMapScale } from '@/lib/stage-model/map-scale';
import { offeredMaps, scaleOfMap, STAGE_MAPS } from './stage-maps';
import { makeReachSampler } from './sheet-reach';
import { Picture, STAGE_FRAME, STAGE_HEIGHT } from './stage-picture';
import type { StageProps } from './stage-props';
import type { SurfaceHit } from './surface-picker';
import { MapChoice, SheetFade, ViewChoice } from './stage-toolbar';
import { traceOfCut } from './trace-of-cut';
import { useSheetModel } from './use-sheet-model';
import { useStageEngine, type EngineHandlers } from './use-stage-engine';

/** The stage with its 3D code; reached through `Stage`, which loads it. */
export default function StageView(props: StageProps) {
  const { title, meta, limits, pins = [], activePin = null, placing = false, sectionLine = null } = props;
  const { theme, units } = usePreferences();
  const sheetMeta = props.sheet?.meta ?? null;
  const offered = offeredMaps(meta, limits, sheetMeta);
  // A page that shows another model keeps its map where that model has it.
  const map = offered.includes(props.map) ? props.map : 'plain';
  const mapWords = STAGE_MAPS.find(({ id }) => id === map)!.words;
  const [hit, setHit] = useState<SurfaceHit | null>(null);
  const [spoken, setSpoken] = useState('');
  const [crossHair, setCrossHair] = useState(false);
  const [viewWords, setViewWords] = useState('isometric view');
  const focusable = useRef<HTMLDivElement>(null);
  const keys = useId();
  const foot = useRef<HTMLDivElement>(null);
  const [kept, setKept] = useState<Kept | null>(null);

  const handlers = useRef<EngineHandlers>({ onHover: () => {}, onPress: () => {}, onRest: () => {} });
  const { host, engine, problem, lost, redraw } = useStageEngine(props.modelUrl, meta, handlers);

  const sheet = useSheetModel(props.sheet, engine?.model ?? null);
  const [fade, setFade] = useState(0);

  const place = (found: SurfaceHit | null) => {
    if (found && engine) props.onPlace?.(found.at, found.normal, engine.control.view);
  };

  const readMiddle = () => {
    const found = engine?.control.pickMiddle() ?? null;
    setHit(found);
    setSpoken(
      found ? readSurface(found, map, limits, units) : 'Nothing of the template under the cross-hair',
    );
  };

  useLayoutEffect(() => {
    handlers.current = {
      onHover: (at) => {
        if (crossHair) return;
        setHit(at && engine ? engine.control.pick(...at) : null);
      },
      onPress: (at) => {
        focusable.current?.focus({ preventScroll: true });
        setCrossHair(false);
        const found = engine?.control.pick(...at) ?? null;
        setHit(found);
        if (placing) place(found);
      },
      onRest: (view) => {
        setViewWords(describeView(fromCamera(view)));
        if (crossHair) readMiddle();
        props.onViewChange?.(view);
      },
    };
  });

  useEffect(() => {
    engine?.scene.setMap(map, scaleOfMap(map, meta, limits, sheetMeta), limits.layerMm ?? 0);
    engine?.control.invalidate();
  }, [engine, map, meta, limits, sheetMeta]);

  useEffect(() => {
    if (!engine) return;
    engine.picker.setSheet(sheet && makeReachSampler(sheet));
    engine.scene.setSheet(sheet, sheetMeta && sheetMapScale(sheetMeta.gaugeMm, limits));
    engine.scene.setSheetOpacity(sheet ? fade : 0);
    engine.control.invalidate();
  }, [engine, sheet, sheetMeta, limits, fade]);

  const shownTheme = props.theme ?? theme;
  useEffect(() => {
    if (!engine) return undefined;
    const paint = () => {
      engine.scene.setColours(readStageColours(engine.scene.canvas));
      engine.control.invalidate();
    };
    paint();
    const system = window.matchMedia('(prefers-color-scheme: dark)');
    system.addEventListener('change', paint);
    return () => system.removeEventListener('change', paint);
  }, [engine, shownTheme]);

  const [axis, atMm] = [sectionLine?.axis, sectionLine?.atMm];
  useEffect(() => {
    if (!engine) return;
    const trace =
      axis && atMm !== undefined ? traceOfCut(cutSection(engine.model, { axis, atMm })) : new Float32Array(0);
    engine.scene.setCut(trace);
    engine.control.invalidate();
  }, [engine, axis, atMm]);

  useEffect(() => {
    if (engine && props.view) engine.control.show(props.view);
  }, [engine, props.view]);

  const shown = useRef<string | null>(null);
  useEffect(() => {
    if (!engine || shown.current === activePin) return;
    shown.current = activePin;
    const pin = pins.find((p) => p.id === activePin);
    if (pin?.view) engine.control.show(pin.view);
    else if (pin) engine.control.face(pin.at, pin.normal);
  }, [engine, activePin, pins]);

  // On a wide stage the legend stands on its foot: views are fitted above it, and pin words keep clear of it.
  useEffect(() => {
    const [row, host] = [foot.current, focusable.current];
    if (!engine || !row || !host) return undefined;
    const measure = new ResizeObserver(() => {
      const [stage, legend] = [
        host.getBoundingClientRect(),
        row.querySelector('figure')?.getBoundingClientRect(),
      ];
      const over = legend !== undefined && legend.top < stage.bottom - 4;
      setKept(over ? { left: legend.left - stage.left, top: legend.top - stage.top } : null);
      // Seen at a slant the template leaves the corners free; only a legend that reaches the middle takes all its height.
      const reachesMiddle = over && legend.left - stage.left < stage.width * 0.6;
      engine.control.setFoot(over ? (stage.bottom - legend.top) * (reachesMiddle ? 1 : 0.85) : 0);
    });
    measure.observe(row);
    measure.observe(host);
    return () => measure.disconnect();
  }, [engine, map]);

  const { min, max } = meta.boundsMm;
  const bounds = useMemo(() => ({ min, max }), [min, max]);

  const onKey = (event: KeyboardEvent) => {
    if (!engine || event.target !== event.currentTarget) return;
    const plainKey = !event.ctrlKey && !event.metaKey && !event.altKey;
    if (event.key === 'Escape') {
      if (placing) props.onPlaceCancel?.();
      else focusable.current?.blur();
    } else if (plainKey && event.key.toLowerCase() === 'n' && pins.length > 0) {
      const next = pins[(pins.findIndex((p) => p.id === activePin) + 1) % pins.length];
      props.onPinSelect?.(next.id);
    } else if (plainKey && (event.key === 'Enter' || event.key === ' ')) {
      setCrossHair(true);
      if (placing) place(engine.control.pickMiddle());
      else readMiddle();
    } else if (engine.control.key(event)) {
      setCrossHair(true);
    } else return;
    event.preventDefault();
  };

  if (problem) {
    const again = (
      <Button size="small" onPress={redraw}>
        Try again
      </Button>
    );
    return <StageFallback {...props} reason={problem} action={again} />;
  }

  const counts = pins.length === 1 ? '1 pin' : `${pins.length} pins`;
  return (
    <section aria-label={`Model of ${title}`} className={clsx(STAGE_FRAME, 'group/stage', props.className)}>
      <div className="relative z-10 flex flex-wrap items-center justify-between gap-x-6 px-3 pt-1.5 sm:px-4">
        <MapChoice map={map} offered={offered} onMapChange={props.onMapChange} />
        {sheetMeta ? <SheetFade value={fade} onChange={setFade} isReady={sheet !== null} /> : null}
        <ViewChoice
          className="-mx-1.5 max-sm:order-last"
          onView={(id) => engine?.control.standard(id)}
          onFit={() => engine?.control.fit()}
        />
      </div>
      <div className={clsx('relative', STAGE_HEIGHT, 'grow')}>
        <div
          ref={focusable}
          className={clsx(
            'absolute inset-0 outline-offset-[-3px] focus-visible:outline-2',
            placing ? 'cursor-crosshair' : 'cursor-grab active:cursor-grabbing',
          )}
          role="application"
          aria-roledescription="3D view"
          aria-label={`${title}, ${mapWords}, ${viewWords}, ${counts}`}
          aria-describedby={keys}
          tabIndex={0}
          onKeyDown={onKey}
          onFocus={(event) => setCrossHair(event.currentTarget.matches(':focus-visible'))}
          onBlur={() => {
            setCrossHair(false);
            setHit(null);
          }}
        >
          <div ref={host} className="absolute inset-0" />
          {engine ? (
            <StageMarks
              engine={engine}
              bounds={bounds}
              pins={pins}
              activePin={activePin}
              onPinSelect={props.onPinSelect}
              sectionLine={sectionLine}
              onSectionLineChange={props.onSectionLineChange}
              ghost={placing ? (hit?.at ?? null) : null}
              highlight={props.highlight ?? null}
              crossHair={crossHair}
              kept={kept}
            />
          ) : (
            <div className="absolute inset-0">
              <Picture {...props} />
            </div>
          )}
        </div>
        {lost ? (
          <div className="absolute inset-0 flex flex-col items-start gap-2 bg-sheet p-6">
            <p>The graphics driver has dropped the model. It comes back by itself, or draw it again.</p>
            <Button size="small" onPress={redraw}>
              Draw again
            </Button>
          </div>
        ) : null}
      </div>
      <StageFoot
        ref={foot}
        map={map}
        meta={meta}
        sheet={sheetMeta}
        limits={limits}
        reading={hit ? readSurface(hit, map, limits, units) : null}
        figure={hit ? figureAt(hit, map, limits) : null}
        hint={!engine ? 'loading' : placing ? 'placing' : pins.length > 0 ? 'pins' : 'free'}
      />
      <p id={keys} className="sr-only">
        Arrow keys turn, Shift and arrow keys shift, plus and minus zoom, 1 to 6 show the front, right, back,
        left, top and underside, 7 the isometric view, F fits, N goes to the next pin, Enter reads the surface
        at the cross-hair
        {placing ? ' and pins the note there, Escape leaves off' : ''}.
      </p>
      <p role="status" className="sr-only">
        {spoken}
      </p>
    </section>
  );
}
