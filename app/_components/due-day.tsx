'use client';

import type { Standing } from '@/lib/review/schemas';
import { isOverdue } from './is-overdue';
import { StatusWord } from './status-word';
import { formatDay } from './format-time';
import { usePreferences } from './preferences-context';
import { useNow } from './use-now';

/** When a template is due; overdue, in a word and a shape, once the day is over where the reader is. */
export function DueDay({ on, standing }: { on: string; standing: Standing }) {
  const { zone } = usePreferences();
  const now = useNow();
  return (
    <span className="inline-flex flex-wrap items-center gap-x-2">
      <time dateTime={on} className="whitespace-nowrap">
        {formatDay(new Date(`${on}T12:00:00Z`), 'UTC')}
      </time>
      {isOverdue(on, standing, zone, now) ? <StatusWord state="overdue" /> : null}
    </span>
  );
}
