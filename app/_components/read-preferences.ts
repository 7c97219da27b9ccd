import 'server-only';
import { cookies } from 'next/headers';
import { parsePreferences, type Preferences } from './preferences';

/** The reader's preferences from this request's cookies. */
export async function readPreferences(): Promise<Preferences> {
  const jar = await cookies();
  return parsePreferences((name) => {
    const value = jar.get(name)?.value;
    return value === undefined ? undefined : decodeURIComponent(value);
  });
}
