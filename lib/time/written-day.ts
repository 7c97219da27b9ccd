/** A day without a time, as mails give it: `2026-10-25` becomes `25 Oct 2026`. Browser-safe. */
export const writtenDay = (day: string): string =>
  new Intl.DateTimeFormat('en-GB', {
    timeZone: 'UTC',
    day: 'numeric',
    month: 'short',
    year: 'numeric',
  }).format(new Date(`${day}T12:00:00Z`));
