'use client';

import { createContext, use, useCallback, useEffect, useMemo, useState, useSyncExternalStore } from 'react';
import type { ReactNode } from 'react';
import { preferenceCookies, type Preferences, type Theme, type Units } from './preferences';

interface PreferencesValue {
  theme: Theme;
  units: Units;
  zone: string;
  /** When the server rendered this page, so that relative times agree while hydrating. */
  renderedAt: number;
  setTheme: (theme: Theme) => void;
  setUnits: (units: Units) => void;
}

const PreferencesContext = createContext<PreferencesValue>({
  theme: 'system',
  units: 'mm',
  zone: 'UTC',
  renderedAt: 0,
  setTheme: () => {},
  setUnits: () => {},
});

function writeCookie(name: string, value: string): void {
  const secure = window.location.protocol === 'https:' ? '; Secure' : '';
  document.cookie = `${name}=${encodeURIComponent(value)}; Path=/; Max-Age=31536000; SameSite=Lax${secure}`;
}

const neverChanges = () => () => {};
const browserZone = () => Intl.DateTimeFormat().resolvedOptions().timeZone || 'UTC';

export function PreferencesProvider(props: {
  initial: Preferences;
  renderedAt: number;
  children: ReactNode;
}) {
  const { initial, renderedAt, children } = props;
  const [theme, keepTheme] = useState(initial.theme);
  const [units, keepUnits] = useState(initial.units);
  const zone = useSyncExternalStore(neverChanges, browserZone, () => initial.zone ?? 'UTC');

  useEffect(() => {
    if (zone !== initial.zone) writeCookie(preferenceCookies.zone, zone);
  }, [zone, initial.zone]);

  const setTheme = useCallback((next: Theme) => {
    keepTheme(next);
    document.documentElement.dataset.theme = next;
    writeCookie(preferenceCookies.theme, next);
  }, []);
  const setUnits = useCallback((next: Units) => {
    keepUnits(next);
    writeCookie(preferenceCookies.units, next);
  }, []);

  const value = useMemo(
    () => ({ theme, units, zone, renderedAt, setTheme, setUnits }),
    [theme, units, zone, renderedAt, setTheme, setUnits],
  );
  return <PreferencesContext value={value}>{children}</PreferencesContext>;
}

/** The reader's theme, units and time zone, with setters that also write the cookie. */
export function usePreferences(): PreferencesValue {
  return use(PreferencesContext);
}
