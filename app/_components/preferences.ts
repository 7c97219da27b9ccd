/** A reader's own settings, kept in plain cookies so that the first byte is already right. Browser-safe. */
export type Theme = 'system' | 'light' | 'dark';
export type Units = 'mm' | 'in';

export interface Preferences {
  theme: Theme;
  units: Units;
  /** IANA zone of the reader; null until the browser has told it once. */
  zone: string | null;
}

export const preferenceCookies = {
  theme: 'firstpull-theme',
  units: 'firstpull-units',
  zone: 'firstpull-zone',
} as const satisfies Record<keyof Preferences, string>;

/** Reads preferences through `get(cookieName)`; anything unknown falls back to system, mm and no zone. */
export function parsePreferences(get: (name: string) => string | undefined): Preferences {
  const theme = get(preferenceCookies.theme);
  const units = get(preferenceCookies.units);
  const zone = get(preferenceCookies.zone);
  return {
    theme: theme === 'light' || theme === 'dark' ? theme : 'system',
    units: units === 'in' ? 'in' : 'mm',
    zone: zone && isZone(zone) ? zone : null,
  };
}

/** True when this engine knows the IANA zone name. */
export function isZone(name: string): boolean {
  if (!/^[A-Za-z0-9_+\-/]{1,64}$/.test(name)) return false;
  try {
    new Intl.DateTimeFormat('en', { timeZone: name });
    return true;
  } catch {
    return false;
  }
}
