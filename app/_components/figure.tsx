import clsx from 'clsx';
import { formatNumber } from './format-figure';

export interface FigureProps {
  value: number | null | undefined;
  /** `mm`, `°`, `%`, `s` … A degree sign sits tight, anything else after a thin space. */
  unit?: string;
  digits?: number;
  className?: string;
}

/** One number in the figure face. For lengths that follow the reader's units use `Length`. */
export function Figure({ value, unit, digits = 2, className }: FigureProps) {
  return (
    <span className={clsx('font-mono whitespace-nowrap tabular-nums', className)}>
      {formatNumber(value, digits)}
      {unit && value != null ? (unit === '°' ? unit : `\u202f${unit}`) : null}
    </span>
  );
}
