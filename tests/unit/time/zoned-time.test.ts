import { describe, expect, it } from 'vitest';
import { zonedTime } from '@/lib/time/zoned-time';

describe('a time with its zone', () => {
  it.each([
    ['2026-10-25T00:30:10.000Z', 'Europe/Berlin', '2026-10-25 02:30:10 +02:00 Europe/Berlin'],
    // The repeated hour of the night when clocks go back is told apart by its offset.
    ['2026-10-25T01:30:10.000Z', 'Europe/Berlin', '2026-10-25 02:30:10 +01:00 Europe/Berlin'],
    ['2026-01-01T00:00:00.000Z', 'UTC', '2026-01-01 00:00:00 +00:00 UTC'],
    ['2026-06-30T23:59:59.999Z', 'Asia/Kolkata', '2026-07-01 05:29:59 +05:30 Asia/Kolkata'],
    ['2026-01-15T12:00:00.000Z', 'America/St_Johns', '2026-01-15 08:30:00 -03:30 America/St_Johns'],
    ['2026-01-15T12:00:00.000Z', 'Pacific/Kiritimati', '2026-01-16 02:00:00 +14:00 Pacific/Kiritimati'],
  ])('%s in %s', (instant, zone, expected) => expect(zonedTime(instant, zone)).toBe(expected));
});
