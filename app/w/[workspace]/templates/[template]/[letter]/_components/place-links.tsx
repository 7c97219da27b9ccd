'use client';

import { usePreferences } from '@/app/_components/preferences-context';
import { MetaButton } from './meta-button';
import { placeWords } from './place-words';
import { useRoom } from './room-context';

const shown = 3;

/** Where on the model: each place in words, and a press brings the stage there. */
export function PlaceLinks(props: {
  places: readonly { at: readonly [number, number, number] }[];
  itemKey: string;
}) {
  const { places, itemKey } = props;
  const { units } = usePreferences();
  const { showPlace } = useRoom();
  const more = places.length - shown;
  return (
    <>
      {places.slice(0, shown).map((place, index) => (
        <MetaButton
          key={index}
          onPress={() => showPlace(itemKey, place.at)}
          className="font-mono text-xs! text-slate! print:block! print:no-underline"
        >
          <span className="sr-only">Show on the model: </span>
          {placeWords(place.at, units)}
        </MetaButton>
      ))}
      {more > 0 ? <span>{more === 1 ? 'and 1 more place' : `and ${more} more places`}</span> : null}
    </>
  );
}
