import type { Constant } from './find-constants';

/** What no test holds, each group with its reason; everything else must be held. */
const EXEMPT: { reason: string; is: (constant: Constant) => boolean }[] = [
  {
    reason:
      'guards against rounding: anything from the rounding of doubles up to the smallest length that counts serves as well',
    is: ({ value, file, name }) =>
      value <= 1e-6 &&
      Number.isInteger(Math.log10(value)) &&
      !/^(physics|recipe)/.test(file) &&
      !/^[A-Z_]+$/.test(name),
  },
  {
    reason: 'shares of the progress bar and widths of the printed summary',
    is: ({ file }) => /^(stages|summarise|cli)\.ts$/.test(file),
  },
];

export function exemptionOf(constant: Constant): string | null {
  return EXEMPT.find(({ is }) => is(constant))?.reason ?? null;
}
