import { describe, expect, it } from 'vitest';
import { liveStatusOf, patienceMs, pollMs } from '@/app/_components/live/live-status';

describe('liveStatusOf', () => {
  it.each([
    [{ online: true, subscribed: true, waitedEnough: false }, 'live'],
    [{ online: true, subscribed: true, waitedEnough: true }, 'live'],
    [{ online: true, subscribed: false, waitedEnough: false }, 'connecting'],
    [{ online: true, subscribed: false, waitedEnough: true }, 'polling'],
    [{ online: false, subscribed: true, waitedEnough: true }, 'offline'],
    [{ online: false, subscribed: false, waitedEnough: false }, 'offline'],
  ] as const)('%j is %s', (signals, status) => {
    expect(liveStatusOf(signals)).toBe(status);
  });

  it('says within ten seconds that it is not live, and asks at least every thirty', () => {
    expect(patienceMs).toBeLessThanOrEqual(10_000);
    expect(pollMs).toBeLessThanOrEqual(30_000);
  });
});
