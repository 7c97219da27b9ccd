import { describe, expect, it } from 'vitest';
import { formatMoment } from '@/app/_components/format-time';
import { zonedTime } from '@/lib/time/zoned-time';

describe('a time with its zone', () => {
  it.each([
    ['2026-10-25T00:30:10.000Z', 'Europe/Berlin', '25 Oct 2026, 02:30:10 CEST (UTC+02:00, Europe/Berlin)'],
    // The repeated hour of the night when clocks go back is told apart by its offset.
    ['2026-10-25T01:30:10.000Z', 'Europe/Berlin', '25 Oct 2026, 02:30:10 CET (UTC+01:00, Europe/Berlin)'],
    ['2026-01-01T00:00:00.000Z', 'UTC', '1 Jan 2026, 00:00:00 UTC'],
    ['2026-06-30T23:59:59.999Z', 'Asia/Kolkata', '1 Jul 2026, 05:29:59 (UTC+05:30, Asia/Kolkata)'],
    ['2026-01-15T12:00:00.000Z', 'America/St_Johns', '15 Jan 2026, 08:30:00 (UTC-03:30, America/St_Johns)'],
    [
      '2026-01-15T12:00:00.000Z',
      'Pacific/Kiritimati',
      '16 Jan 2026, 02:00:00 (UTC+14:00, Pacific/Kiritimati)',
    ],
    ['2026-12-01T15:38:10.000Z', 'Europe/Lisbon', '1 Dec 2026, 15:38:10 WET (UTC+00:00, Europe/Lisbon)'],
  ])('%s in %s', (instant, zone, expected) => expect(zonedTime(instant, zone)).toBe(expected));

  it('begins as the pages write it', () => {
    const at = new Date('2026-12-01T15:38:00Z');
    const [clock] = formatMoment(at, 'Europe/Lisbon').split(' WET');
    expect(zonedTime(at.toISOString(), 'Europe/Lisbon').startsWith(clock)).toBe(true);
  });
});
