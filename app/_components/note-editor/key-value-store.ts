import { createStore, del, entries, get, set } from 'idb-keyval';

/** A small store of plain values on this device. */
export interface KeyValueStore {
  get<T>(key: string): Promise<T | undefined>;
  set(key: string, value: unknown): Promise<void>;
  delete(key: string): Promise<void>;
  entries<T>(): Promise<[string, T][]>;
}

/** Keeps values for as long as the page stays open; used where the browser refuses a database. */
export function memoryStore(): KeyValueStore {
  const values = new Map<string, unknown>();
  return {
    get: async <T>(key: string) => structuredClone(values.get(key)) as T | undefined,
    set: async (key, value) => void values.set(key, structuredClone(value)),
    delete: async (key) => void values.delete(key),
    entries: async <T>() => structuredClone([...values]) as [string, T][],
  };
}

/** An IndexedDB database of one table; signing out deletes every database of this site. */
export function deviceStore(database: string): KeyValueStore {
  if (typeof indexedDB === 'undefined') return memoryStore();
  const table = createStore(database, 'values');
  const fallback = memoryStore();
  const attempt = async <R>(onDevice: () => Promise<R>, inMemory: () => Promise<R>): Promise<R> => {
    try {
      return await onDevice();
    } catch {
      return inMemory();
    }
  };
  return {
    get: <T>(key: string) =>
      attempt(
        () => get<T>(key, table),
        () => fallback.get<T>(key),
      ),
    set: (key, value) =>
      attempt(
        () => set(key, value, table),
        () => fallback.set(key, value),
      ),
    delete: (key) =>
      attempt(
        () => del(key, table),
        () => fallback.delete(key),
      ),
    entries: <T>() =>
      attempt(
        () => entries<string, T>(table),
        () => fallback.entries<T>(),
      ),
  };
}
