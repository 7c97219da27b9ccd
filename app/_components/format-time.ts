const minute = 60_000;
const hour = 60 * minute;
const day = 24 * hour;

const cache = new Map<string, Intl.DateTimeFormat>();

function formatter(zone: string, options: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
  const key = `${zone}|${JSON.stringify(options)}`;
  let found = cache.get(key);
  if (!found) {
    found = new Intl.DateTimeFormat('en-GB', { ...options, timeZone: zone });
    cache.set(key, found);
  }
  return found;
}

/** `3 Feb 2025, 09:40 CET`: day, time and zone, for anything signed or logged. */
export function formatMoment(at: Date, zone: string): string {
  return formatter(zone, {
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    timeZoneName: 'short',
  }).format(at);
}

/** `3 Feb 2025`. */
export function formatDay(at: Date, zone: string): string {
  return formatter(zone, { day: 'numeric', month: 'short', year: 'numeric' }).format(at);
}

/** `09:40`. */
export function formatClock(at: Date, zone: string): string {
  return formatter(zone, { hour: '2-digit', minute: '2-digit' }).format(at);
}

/** Length of a span in one unit, cut down and never rounded up: `less than a minute`, `12 min`, `5 h`, `3 days`. */
export function formatSpan(milliseconds: number): string {
  const span = Math.abs(milliseconds);
  if (span < minute) return 'less than a minute';
  if (span < hour) return `${Math.floor(span / minute)} min`;
  if (span < 2 * day) return `${Math.floor(span / hour)} h`;
  if (span < 90 * day) return `${Math.floor(span / day)} days`;
  if (span < 730 * day) return `${Math.floor(span / (30.44 * day))} months`;
  return `${Math.floor(span / (365.25 * day))} years`;
}

/** `2 h ago`, `in 3 days`, `just now`. */
export function formatRelative(at: Date, now: number): string {
  const difference = at.getTime() - now;
  if (Math.abs(difference) < minute) return difference > 0 ? 'in a moment' : 'just now';
  return difference > 0 ? `in ${formatSpan(difference)}` : `${formatSpan(difference)} ago`;
}
