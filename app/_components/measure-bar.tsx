import clsx from 'clsx';
import { formatNumber } from './format-figure';

export interface MeasureBarProps {
  value: number;
  limit: number;
  unit: string;
  /** `at-least`: the value should reach the limit; `at-most`: it should stay below. */
  sense: 'at-least' | 'at-most';
  digits?: number;
  /** Right end of the scale; by default a little beyond the larger of the two. */
  max?: number;
}

/** What was measured against what is wanted, drawn to scale from zero. */
export function MeasureBar({ value, limit, unit, sense, digits = 2, max }: MeasureBarProps) {
  const broken = sense === 'at-least' ? value < limit : value > limit;
  const end = max ?? Math.max(value, limit, Number.MIN_VALUE) * 1.3;
  const share = (number: number) => Math.min(100, Math.max(0, (number / end) * 100));
  const wanted = `${sense === 'at-least' ? 'wanted' : 'at most'} ${formatNumber(limit, digits)}`;
  const late = share(limit) > 62;
  const measured = `measured ${formatNumber(value, digits)}${unit === '°' || !unit ? '' : '\u202f'}${unit}`;
  return (
    <div
      role="img"
      aria-label={`Measured ${formatNumber(value, digits)} ${unit}, ${wanted} ${unit}`}
      className="relative pt-4"
    >
      <span
        aria-hidden
        className={clsx(
          'absolute top-0 font-mono text-[0.6875rem] leading-4',
          broken && 'text-madder',
          share(limit) > 38 ? 'left-0' : 'right-0',
        )}
      >
        {measured}
      </span>
      <span className="block h-1.5 bg-rule forced-colors:h-2 forced-colors:border">
        <span
          className={clsx('block h-full forced-colors:bg-[Highlight]', broken ? 'bg-madder' : 'bg-verdigris')}
          style={{ width: `${share(value)}%` }}
        />
      </span>
      <span
        aria-hidden
        className="absolute bottom-[-3px] h-4 w-0.5 bg-ink"
        style={{ left: `${share(limit)}%` }}
      />
      <span
        aria-hidden
        className={clsx('absolute top-0 font-mono text-[0.6875rem] leading-4', late && '-translate-x-full')}
        style={{ left: late ? `calc(${share(limit)}% - 4px)` : `calc(${share(limit)}% + 6px)` }}
      >
        {wanted}
      </span>
    </div>
  );
}
