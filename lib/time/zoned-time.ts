const named = (date: Date, timeZone: string, timeZoneName: 'short' | 'longOffset') =>
  new Intl.DateTimeFormat('en-GB', { timeZone, timeZoneName })
    .formatToParts(date)
    .find(({ type }) => type === 'timeZoneName')?.value ?? '';

/**
 * An instant as mails and papers give it, written as on the pages and then to the second, with offset and zone so that
 * it stands alone: `25 Oct 2026, 02:30:10 CET (UTC+01:00, Europe/Berlin)`.
 */
export function zonedTime(instant: string, timeZone: string): string {
  const date = new Date(instant);
  const moment = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    second: '2-digit',
    hourCycle: 'h23',
  }).format(date);
  const short = named(date, timeZone, 'short');
  if (timeZone === 'UTC') return `${moment} ${short}`;
  const offset = named(date, timeZone, 'longOffset').replace('GMT', '') || '+00:00';
  // `GMT-5` would only repeat the offset.
  const name = /^(GMT|UTC)[+-]/.test(short) ? '' : ` ${short}`;
  return `${moment}${name} (UTC${offset}, ${timeZone})`;
}
