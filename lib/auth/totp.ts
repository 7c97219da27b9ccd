import { createOTP } from '@better-auth/utils/otp';

const period = 30;
/** Steps before and after the present one that are taken, for clocks that differ. */
const drift = 1;

/**
 * The 30-second step (RFC 6238, six digits, SHA-1) whose code this is, at most one away from now; null for none.
 * `secret` is used as its UTF-8 bytes.
 */
export async function stepOfCode(secret: string, code: string, now = Date.now()): Promise<number | null> {
  const present = Math.floor(now / 1000 / period);
  const otp = createOTP(secret, { digits: 6, period });
  let found: number | null = null;
  // All of them each time: the time taken does not tell which one it was.
  for (let step = present - drift; step <= present + drift; step++)
    if ((await otp.hotp(step)) === code) found = step;
  return found;
}
