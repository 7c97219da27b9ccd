import type { ZxcvbnFactory } from '@zxcvbn-ts/core';
import { APIError } from 'better-auth/api';
import { passwordMax, passwordMin, passwordLength } from './password-rules';

/**
 * The blocklist that NIST SP 800-63B-4 asks for: 49,000 common passwords (@zxcvbn-ts/language-common, MIT), the words
 * of the account, and what is easily made of them, of rows of keys, dates and repetition (@zxcvbn-ts/core, MIT).
 */
let estimator: Promise<ZxcvbnFactory> | undefined;
const load = async () => {
  const [{ ZxcvbnFactory: Estimator }, common] = await Promise.all([
    import('@zxcvbn-ts/core'),
    import('@zxcvbn-ts/language-common'),
  ]);
  return new Estimator({
    dictionary: { passwords: common.dictionary['passwords-common'] },
    graphs: common.adjacencyGraphs,
    maxLength: looked,
  });
};
/** The estimate takes some 80 ms at worst for so many characters, and seconds for many more. */
const looked = 40;
/** Guesses that a password must outlast, as a power of ten; without the account's own words, fewer. */
const enough = 10;
const enoughBesides = 6;

export type Owned = { name: string; email: string };

const fold = (text: string) => text.normalize('NFKC').toLowerCase();

/** What anybody tries first for this person: name, address and their parts, and the name of the service. */
function ownWords({ name, email }: Owned): string[] {
  const parts = [name, email].flatMap((text) => fold(text).split(/[^\p{L}\p{N}]+/u));
  const whole = [name, email, email.split('@')[0]].map((text) => fold(text).replace(/[^\p{L}\p{N}]+/gu, ''));
  return [...new Set(['firstpull', ...parts, ...whole])]
    .filter((word) => word.length >= 3)
    .sort((a, b) => b.length - a.length);
}

/**
 * Why a password may not be chosen, as a sentence; null where it may. Length, lists and own words: nothing is asked
 * about kinds of characters.
 */
export async function weakness(password: string, owner: Owned): Promise<string | null> {
  const length = passwordLength(password);
  if (length < passwordMin) return `Use ${passwordMin} characters or more; a few words make a good password.`;
  if (length > passwordMax) return `Use ${passwordMax} characters or fewer.`;
  const own = ownWords(owner);
  const zxcvbn = await (estimator ??= load());
  const powers = (text: string) => {
    const characters = [...text];
    // Weak only where both ends are: a long tail of random characters outweighs a poor beginning.
    const ends = [characters.slice(0, looked), characters.slice(-looked)];
    return Math.max(...ends.map((end) => zxcvbn.check(end.join(''), own).guessesLog10));
  };
  if (powers(password) < enough)
    return 'This password is on the lists of common ones, or made of what stands on them: words in a row, rows of keys, repetition, dates. Choose a few words that have nothing to do with each other.';
  const plain = fold(password).replace(/[^\p{L}\p{N}]+/gu, '');
  const besides = own.reduce((rest, word) => rest.replaceAll(word, ''), plain);
  if (besides !== plain && powers(besides) < enoughBesides)
    return 'This password is little more than your name, your address or the name of Firstpull. Choose words that nobody connects with you.';
  return null;
}

/** @throws APIError `WEAK_PASSWORD`, with the sentence, for the endpoints of the identity service */
export async function refuseWeak(password: unknown, owner: Owned): Promise<void> {
  const sentence = typeof password === 'string' ? await weakness(password, owner) : null;
  if (sentence) throw new APIError('BAD_REQUEST', { code: 'WEAK_PASSWORD', message: sentence });
}
