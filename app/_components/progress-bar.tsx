'use client';

import clsx from 'clsx';
import type { ReactNode } from 'react';
import { Label, ProgressBar as AriaProgressBar } from 'react-aria-components';

export interface ProgressBarProps {
  label: ReactNode;
  /** Share done, 0 to 1; null while it is not known. */
  value: number | null;
  /** Shown on the right instead of the percentage, such as `12.4 of 60 MB, 8 s left`. */
  detail?: string;
  className?: string;
}

export function ProgressBar({ label, value, detail, className }: ProgressBarProps) {
  const share = value === null ? 0 : Math.min(1, Math.max(0, value));
  const text = detail ?? (value === null ? 'working' : `${Math.floor(share * 100)} %`);
  return (
    <AriaProgressBar
      value={share}
      minValue={0}
      maxValue={1}
      valueLabel={text}
      isIndeterminate={value === null}
      className={clsx('flex flex-col gap-1', className)}
    >
      <span className="flex flex-wrap justify-between gap-x-4 text-sm">
        <Label className="font-semibold">{label}</Label>
        <span className="font-mono text-xs text-slate tabular-nums">{text}</span>
      </span>
      <span className="block h-1.5 overflow-hidden bg-rule forced-colors:h-2 forced-colors:border">
        {value === null ? (
          <span className="skeleton block h-full" />
        ) : (
          <span
            className="block h-full bg-verdigris forced-colors:bg-[Highlight]"
            style={{ width: `${share * 100}%` }}
          />
        )}
      </span>
    </AriaProgressBar>
  );
}
