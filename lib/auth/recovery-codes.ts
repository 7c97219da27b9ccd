import { createHmac, randomInt } from 'node:crypto';
import { authEnv } from '@/lib/env/env';

const amount = 10;
/** Crockford's base 32: nothing in it is taken for something else. Sixteen of them are 80 bits. */
const letters = '0123456789abcdefghjkmnpqrstvwxyz';
const hashed = /^[0-9a-f]{64}$/;

const plain = (code: string) =>
  code
    .toLowerCase()
    .replace(/[^a-z0-9]/g, '')
    .replace(/o/g, '0')
    .replace(/[il]/g, '1');

/** Ten codes such as `7k2m-9xqd-03fa-tz5w`. */
export const newRecoveryCodes = (): string[] =>
  Array.from({ length: amount }, () =>
    Array.from({ length: 4 }, () =>
      Array.from({ length: 4 }, () => letters[randomInt(letters.length)]).join(''),
    ).join('-'),
  );

/** What is stored of a code: a hash under the service's secret. Case, blanks and hyphens do not matter. */
export const hashRecoveryCode = (code: string): string =>
  createHmac('sha256', `${authEnv().BETTER_AUTH_SECRET}:recovery-codes`).update(plain(code)).digest('hex');

/**
 * How the identity service keeps the list. It stores new codes and, after one was used, the rest of the hashes;
 * it compares what `verifyRecoveryCode` of the hooks has hashed before.
 */
export const recoveryCodeStorage = {
  encrypt: async (json: string) =>
    JSON.stringify(
      (JSON.parse(json) as string[]).map((code) => (hashed.test(code) ? code : hashRecoveryCode(code))),
    ),
  decrypt: async (stored: string) => stored,
};
