import { describe, expect, it } from 'vitest';
import { stepOfCode } from '@/lib/auth/totp';

/** RFC 6238 appendix B, the SHA-1 rows: eight digits there, the last six of them here. */
const secret = '12345678901234567890';
const vectors = [
  [59, '94287082'],
  [1_111_111_109, '07081804'],
  [1_111_111_111, '14050471'],
  [1_234_567_890, '89005924'],
  [2_000_000_000, '69279037'],
  [20_000_000_000, '65353130'],
] as const;

describe('the step of a code', () => {
  it.each(vectors)('at %i s is the one of RFC 6238', async (seconds, code) => {
    expect(await stepOfCode(secret, code.slice(2), seconds * 1000)).toBe(Math.floor(seconds / 30));
  });

  it.each([-60, -30, 0, 30, 60])('is taken %i s away from the clock, one step at most', async (away) => {
    const [seconds, code] = vectors[3];
    const found = await stepOfCode(secret, code.slice(2), (seconds + away) * 1000);
    expect(found).toBe(Math.abs(away) <= 30 ? Math.floor(seconds / 30) : null);
  });

  it.each(['', '00592', '0059244', '005925', 'x05924', '89005924'])('%j is none', async (code) => {
    expect(await stepOfCode(secret, code, 1_234_567_890_000)).toBeNull();
  });
});
