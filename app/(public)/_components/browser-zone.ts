/** The zone of this browser, e.g. `Europe/Lisbon`; the server takes universal time for what it does not know. */
export const browserZone = (): string => Intl.DateTimeFormat().resolvedOptions().timeZone ?? 'UTC';
