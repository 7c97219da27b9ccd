import type { MapWords } from './map-words';

/** Under the scale: how much is beyond the limit, in madder where something is, and what the figures span. */
export function LegendWords({ area, range, broken }: MapWords) {
  return (
    <>
      <span className={broken ? 'text-madder' : undefined}>{area}</span>
      {broken ? ', hatched' : ''}
      {range ? `${/[.:]$/.test(area) ? '' : '.'} ${range}` : ''}
    </>
  );
}
