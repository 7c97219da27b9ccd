import { z } from 'zod';

export const passwordMin = 12;
export const passwordMax = 128;

/** A password that a person chooses: long, of any characters; no rule about kinds of characters. Browser-safe. */
export const NewPassword = z
  .string()
  .min(passwordMin, `At least ${passwordMin} characters; a few words make a good one.`)
  .max(passwordMax, `At most ${passwordMax} characters.`);
