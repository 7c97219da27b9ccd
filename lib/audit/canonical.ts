import { createHash } from 'node:crypto';
import canonicalize from 'canonicalize';

/** RFC 8785 (JCS) text of a JSON value. Throws where JSON has no form for it (undefined, NaN, Infinity). */
export function canonical(value: unknown): string {
  const text = canonicalize(value);
  if (text === undefined) throw new TypeError('not a JSON value');
  return text;
}

/** Lower-case hex SHA-256 of bytes or of UTF-8 text. */
export const sha256 = (data: string | Uint8Array): string => createHash('sha256').update(data).digest('hex');

/** SHA-256 over the RFC 8785 canonical JSON of `value`. */
export const digestOf = (value: unknown): string => sha256(canonical(value));
