import { dayIn } from '@/lib/time/day-in';

/** Nobody is reminded in the night: from this hour on, where they are. */
const firstHour = 7;

const hourIn = (timeZone: string, at: Date) =>
  Number(new Intl.DateTimeFormat('en-GB', { timeZone, hour: '2-digit', hourCycle: 'h23' }).format(at));
const dayBefore = (day: string) =>
  new Date(Date.parse(`${day}T12:00:00Z`) - 86_400_000).toISOString().slice(0, 10);

/**
 * Whether somebody in this zone is to be reminded now of a gate that is due on a day (`2026-10-25`): the day before it
 * (not on the day on which it opened: they have just been told) and on the day itself, from seven in the morning.
 */
export function reminderDue(
  gate: { dueOn: string; openedAt: Date },
  timeZone: string,
  now: Date,
): 'tomorrow' | 'today' | null {
  if (hourIn(timeZone, now) < firstHour) return null;
  const day = dayIn(timeZone, now);
  if (day === gate.dueOn) return 'today';
  if (day !== dayBefore(gate.dueOn) || day === dayIn(timeZone, gate.openedAt)) return null;
  return 'tomorrow';
}
