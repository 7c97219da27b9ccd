import type { Standing } from '@/lib/review/schemas';
import { dayIn } from '@/lib/time/day-in';

/** A due date is kept once a revision is approved; what became of it later does not make it late again. */
const kept: readonly Standing[] = ['approved', 'released', 'recalled', 'superseded', 'retired'];

/** Whether the day `on` (`2026-10-25`) is over in the reader's zone and nothing is agreed yet. `now` in ms since 1970. */
export const isOverdue = (on: string, standing: Standing, zone: string, now: number): boolean =>
  !kept.includes(standing) && on < dayIn(zone, new Date(now));
