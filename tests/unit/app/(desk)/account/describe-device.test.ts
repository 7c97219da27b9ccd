import { describe, expect, it } from 'vitest';
import { describeDevice } from '@/app/(desk)/account/_components/describe-device';

const webkit = 'AppleWebKit/537.36 (KHTML, like Gecko)';

describe('describeDevice', () => {
  it.each([
    ['Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0', 'Firefox on Linux'],
    [
      `Mozilla/5.0 (Windows NT 10.0; Win64; x64) ${webkit} Chrome/140.0.0.0 Safari/537.36`,
      'Chrome on Windows',
    ],
    [
      `Mozilla/5.0 (Windows NT 10.0) ${webkit} Chrome/140.0.0.0 Safari/537.36 Edg/140.0.0.0`,
      'Edge on Windows',
    ],
    [`Mozilla/5.0 (Linux; Android 15) ${webkit} Chrome/140.0.0.0 Mobile Safari/537.36`, 'Chrome on Android'],
    [
      'Mozilla/5.0 (Macintosh; Intel Mac OS X 10_15_7) AppleWebKit/605.1.15 (KHTML, like Gecko) Version/18.0 Safari/605.1.15',
      'Safari on macOS',
    ],
    [
      'Mozilla/5.0 (iPhone; CPU iPhone OS 18_0 like Mac OS X) AppleWebKit/605.1.15 (KHTML, like Gecko) Version/18.0 Mobile/15E148 Safari/604.1',
      'Safari on iPhone',
    ],
    ['curl/8.5.0', 'Unknown device'],
    ['', 'Unknown device'],
    [null, 'Unknown device'],
  ])('%j is %s', (userAgent, device) => {
    expect(describeDevice(userAgent)).toBe(device);
  });
});
