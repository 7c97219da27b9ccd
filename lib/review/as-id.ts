import { notFound } from '@/lib/errors/app-error';

const uuid = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;

/** An id from an address. One that cannot be an id answers as a missing object does. */
export function asId(value: unknown, what: string): string {
  if (typeof value !== 'string' || !uuid.test(value)) throw notFound(what);
  return value.toLowerCase();
}
