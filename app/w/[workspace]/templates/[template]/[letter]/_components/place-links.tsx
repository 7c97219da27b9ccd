'use client';

import { Button } from 'react-aria-components';
import { usePreferences } from '@/app/_components/preferences-context';
import { placeWords } from './place-words';
import { useRoom } from './room-context';

const shown = 4;

/** Where on the model: each place in words, and a press brings the stage there. */
export function PlaceLinks(props: {
  places: readonly { at: readonly [number, number, number] }[];
  itemKey: string;
}) {
  const { places, itemKey } = props;
  const { units } = usePreferences();
  const { showPlace } = useRoom();
  if (places.length === 0) return null;
  const more = places.length - shown;
  return (
    <p className="flex flex-wrap items-baseline gap-x-3 text-sm text-slate">
      {places.slice(0, shown).map((place, index) => (
        <Button
          key={index}
          onPress={() => showPlace(itemKey, place.at)}
          className="py-0.5 text-left font-mono text-xs text-slate underline decoration-edge underline-offset-3 hover:text-ink pointer-coarse:py-2"
        >
          <span className="sr-only">Show on the model: </span>
          {placeWords(place.at, units)}
        </Button>
      ))}
      {more > 0 ? <span>and {more} more places</span> : null}
    </p>
  );
}
