import { z } from 'zod';
import { invalid } from '@/lib/errors/app-error';

/** Opaque place in a list: base64url JSON, checked when it comes back. */
export const encodeCursor = (place: unknown): string =>
  Buffer.from(JSON.stringify(place), 'utf8').toString('base64url');

export function decodeCursor<S extends z.ZodType>(schema: S, cursor: string): z.output<S> {
  try {
    return schema.parse(JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8')));
  } catch {
    throw invalid('This place in the list is not known. Start again from the first page.', [
      { pointer: '/cursor', detail: 'Leave it out, or send the one that the page before gave.' },
    ]);
  }
}
