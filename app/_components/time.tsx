'use client';

import clsx from 'clsx';
import { formatClock, formatDay, formatMoment, formatRelative, formatSpan } from './format-time';
import { usePreferences } from './preferences-context';
import { useNow } from './use-now';

export interface TimeProps {
  /** ISO 8601 instant, or a Date. */
  at: string | Date;
  /**
   * `moment` day, time and zone (use it on anything signed); `both` adds how long ago; `relative` and `span` (no
   * "ago") keep the moment in the tooltip; `day` and `clock` show one part.
   */
  show?: 'moment' | 'both' | 'relative' | 'span' | 'day' | 'clock';
  className?: string;
}

/** A `<time>` in the reader's own zone. */
export function Time({ at, show = 'both', className }: TimeProps) {
  const { zone } = usePreferences();
  const now = useNow();
  const date = typeof at === 'string' ? new Date(at) : at;
  if (Number.isNaN(date.getTime())) return <span className={className}>no date</span>;
  const moment = formatMoment(date, zone);
  return (
    <time
      dateTime={date.toISOString()}
      title={show === 'moment' || show === 'both' ? zone : moment}
      className={clsx(show !== 'both' && show !== 'moment' && 'whitespace-nowrap', className)}
    >
      {show === 'moment' ? moment : null}
      {show === 'both' ? (
        <>
          {moment} <span className="text-slate">({formatRelative(date, now)})</span>
        </>
      ) : null}
      {show === 'relative' ? formatRelative(date, now) : null}
      {show === 'span' ? formatSpan(now - date.getTime()) : null}
      {show === 'day' ? formatDay(date, zone) : null}
      {show === 'clock' ? formatClock(date, zone) : null}
    </time>
  );
}
