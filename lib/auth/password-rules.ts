import { z } from 'zod';

/**
 * NIST SP 800-63B-4 §3.1.1.2 asks for 15 characters where the password stands alone, 8 beside a second factor. Ours is
 * 15 for everybody: a second factor can be turned off again, and the password stays.
 */
export const passwordMin = 15;
export const passwordMax = 128;

/** Characters as Unicode counts them (code points, after NFC), so that no script or keyboard is worse off. */
export const passwordLength = (password: string): number => [...password.normalize('NFC')].length;

/** A password that a person chooses: long, of any characters; no rule about kinds of characters. Browser-safe. */
export const NewPassword = z
  .string()
  .refine((password) => passwordLength(password) >= passwordMin, {
    error: `At least ${passwordMin} characters; a few words make a good one.`,
    abort: true,
  })
  .refine((password) => passwordLength(password) <= passwordMax, `At most ${passwordMax} characters.`)
  .meta({ minLength: passwordMin, maxLength: passwordMax });
