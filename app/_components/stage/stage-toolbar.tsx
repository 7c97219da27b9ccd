'use client';

import clsx from 'clsx';
import { Button, ToggleButton, ToggleButtonGroup, Toolbar } from 'react-aria-components';
import { STANDARD_VIEWS, type StandardViewId } from './camera-rig';
import { STAGE_MAPS, type StageMap } from './stage-maps';

/** What is shown on the model: words in a row, the one in use underlined in ink. */
export function MapChoice(props: {
  map: StageMap;
  offered: readonly StageMap[];
  onMapChange: (map: StageMap) => void;
}) {
  const { map, offered, onMapChange } = props;
  return (
    <ToggleButtonGroup
      aria-label="Shown on the model"
      selectionMode="single"
      disallowEmptySelection
      selectedKeys={[map]}
      onSelectionChange={(keys) => {
        const [next] = keys;
        if (next) onMapChange(next as StageMap);
      }}
      className="flex flex-wrap gap-x-4"
    >
      {STAGE_MAPS.filter(({ id }) => offered.includes(id)).map(({ id, label }) => (
        <ToggleButton
          key={id}
          id={id}
          className={clsx(
            'border-b-2 border-transparent py-1 text-sm text-slate pointer-coarse:py-2.5',
            'data-hovered:text-ink data-selected:border-ink data-selected:font-semibold data-selected:text-ink',
          )}
        >
          {label}
        </ToggleButton>
      ))}
    </ToggleButtonGroup>
  );
}

/** How much the formed sheet covers the template: from not at all to wholly. */
export function SheetFade(props: { value: number; onChange: (value: number) => void; isReady: boolean }) {
  const { value, onChange, isReady } = props;
  return (
    <label className="flex items-center gap-2 text-sm text-slate">
      Sheet
      <input
        type="range"
        min={0}
        max={1}
        step={0.05}
        value={value}
        disabled={!isReady}
        aria-label="Formed sheet over the template"
        aria-valuetext={value === 0 ? 'not shown' : `${Math.round(value * 100)} percent`}
        onChange={(event) => onChange(Number(event.target.value))}
        className="h-6 w-24 accent-verdigris pointer-coarse:h-11"
      />
    </label>
  );
}

/** Standard views and fit as plain words: what the keys 1 to 7 and F do. */
export function ViewChoice(props: {
  onView: (id: StandardViewId) => void;
  onFit: () => void;
  className?: string;
}) {
  const views = [STANDARD_VIEWS[6], ...STANDARD_VIEWS.slice(0, 6)];
  const look =
    'px-1.5 py-1 text-xs text-slate data-hovered:text-ink data-hovered:underline data-pressed:text-ink pointer-coarse:py-2.5';
  return (
    <Toolbar aria-label="Views" className={clsx('flex flex-wrap', props.className)}>
      {views.map(({ id, name, key }) => (
        <Button key={id} onPress={() => props.onView(id)} aria-keyshortcuts={key} className={look}>
          {name}
        </Button>
      ))}
      <Button onPress={props.onFit} aria-keyshortcuts="F" className={clsx(look, 'border-l border-rule')}>
        Fit
      </Button>
    </Toolbar>
  );
}
