import { expect } from 'vitest';
import type { FreshDatabase } from './database';
import { fingerprint } from './factory';
import type { House } from './make-house';

/**
 * Expects a run to be refused like `expected` and to change nothing in the house's workspace.
 * @param place asked at each call: the house is made in `beforeAll`
 */
export function refusedIn(place: () => { database: FreshDatabase; house: House }) {
  return async (run: () => Promise<unknown>, expected: Record<string, unknown>): Promise<void> => {
    const { database, house } = place();
    const before = await fingerprint(database, house.workspace.id);
    await expect(run()).rejects.toMatchObject(expected);
    expect(await fingerprint(database, house.workspace.id)).toBe(before);
  };
}
