import { randomInt } from 'node:crypto';

const alphabet = 'abcdefghjkmnpqrstuvwxyz23456789';

/**
 * Address part made from a name, e.g. `harbour-foods-k7qd`. The tail is always there: were it added only when
 * a name is taken, it would tell one studio that another serves the same client.
 */
export function makeSlug(name: string): string {
  const base = name
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 40)
    .replace(/-+$/, '');
  const tail = Array.from({ length: 4 }, () => alphabet[randomInt(alphabet.length)]).join('');
  return `${base || 'space'}-${tail}`;
}
