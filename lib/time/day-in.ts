/** The day that an instant falls on in a zone, as `2026-10-25`; now, unless another instant is given. Browser-safe. */
export function dayIn(timeZone: string, at: Date = new Date()): string {
  return new Intl.DateTimeFormat('en-CA', {
    timeZone,
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
  }).format(at);
}
