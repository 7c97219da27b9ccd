import { describe, expect, it } from 'vitest';
import { groupHex } from '@/app/_components/digest';
import { formatBytes, formatLength, formatNumber } from '@/app/_components/format-figure';
import {
  formatClock,
  formatDay,
  formatMoment,
  formatRelative,
  formatSpan,
} from '@/app/_components/format-time';
import { joinNames } from '@/app/_components/gate-line';
import { initialsOf } from '@/app/_components/initials';
import { parsePreferences } from '@/app/_components/preferences';

const minute = 60_000;
const hour = 60 * minute;
const day = 24 * hour;

describe('times', () => {
  const at = new Date('2026-07-03T07:40:00Z');

  it('show the zone with the moment, in summer and in winter', () => {
    expect(formatMoment(at, 'Europe/Berlin')).toBe('3 Jul 2026, 09:40 CEST');
    expect(formatMoment(new Date('2026-01-03T07:40:00Z'), 'Europe/Berlin')).toBe('3 Jan 2026, 08:40 CET');
    expect(formatMoment(at, 'UTC')).toBe('3 Jul 2026, 07:40 UTC');
  });

  it('fall on the reader’s day', () => {
    const late = new Date('2026-07-03T23:30:00Z');
    expect(formatDay(late, 'UTC')).toBe('3 Jul 2026');
    expect(formatDay(late, 'Asia/Tokyo')).toBe('4 Jul 2026');
    expect(formatClock(late, 'Asia/Tokyo')).toBe('08:30');
  });

  it.each([
    [30_000, 'less than a minute'],
    [minute, '1 min'],
    [hour - 1, '59 min'],
    [hour, '1 h'],
    [2 * day - 1, '47 h'],
    [2 * day, '2 days'],
    [90 * day - 1, '89 days'],
    [92 * day, '3 months'],
    [800 * day, '2 years'],
  ])('a span of %i ms is cut down to %s', (span, text) => {
    expect(formatSpan(span)).toBe(text);
  });

  it('are relative in both directions', () => {
    const now = at.getTime();
    expect(formatRelative(new Date(now - 2 * hour), now)).toBe('2 h ago');
    expect(formatRelative(new Date(now + 3 * day), now)).toBe('in 3 days');
    expect(formatRelative(new Date(now - 5_000), now)).toBe('just now');
    expect(formatRelative(new Date(now + 5_000), now)).toBe('in a moment');
  });
});

describe('figures', () => {
  it('have fixed decimals, a true minus and no minus zero', () => {
    expect(formatNumber(0.305, 2)).toBe((0.305).toFixed(2));
    expect(formatNumber(-3, 1)).toBe('\u22123.0');
    expect(formatNumber(-0.001, 2)).toBe('0.00');
    expect(formatNumber(null)).toBe('–');
    expect(formatNumber(Number.NaN)).toBe('–');
  });

  it('show 25.4 mm as exactly one inch', () => {
    expect(formatLength(25.4, 'mm')).toBe('25.40\u00a0mm');
    expect(formatLength(25.4, 'in')).toBe('1.000\u00a0in');
  });

  it.each([
    [0, '0\u00a0B'],
    [999, '999\u00a0B'],
    [1000, '1.0\u00a0kB'],
    [999_600, '1.0\u00a0MB'],
    [12_345_678, '12.3\u00a0MB'],
    [200_000_000, '200\u00a0MB'],
  ])('%i bytes are %s', (bytes, text) => {
    expect(formatBytes(bytes)).toBe(text);
  });

  it('group a digest by four', () => {
    expect(groupHex('9f3ac27e41d0')).toBe('9f3a c27e 41d0');
    expect(groupHex('9f3ac27e41d0', 8)).toBe('9f3a c27e');
    expect(groupHex('')).toBe('');
  });
});

describe('names', () => {
  it.each([
    ['Lena Okafor', 'LO'],
    ['A. Brandt', 'AB'],
    ['Maria del Carmen Ferro', 'MF'],
    ['Ősz', 'ŐS'],
    ['  ', '?'],
  ])('%j has the initials %s', (name, initials) => {
    expect(initialsOf(name)).toBe(initials);
  });

  it('are joined in words', () => {
    expect(joinNames([])).toBe('');
    expect(joinNames(['A'])).toBe('A');
    expect(joinNames(['A', 'B'])).toBe('A or B');
    expect(joinNames(['A', 'B', 'C'])).toBe('A, B or C');
  });
});

describe('preferences', () => {
  const read = (cookies: Record<string, string>) => parsePreferences((name) => cookies[name]);

  it('default to system, millimetres and no zone', () => {
    expect(read({})).toEqual({ theme: 'system', units: 'mm', zone: null });
  });

  it('keep what is known and drop what is not', () => {
    expect(
      read({ 'firstpull-theme': 'dark', 'firstpull-units': 'in', 'firstpull-zone': 'Europe/Lisbon' }),
    ).toEqual({ theme: 'dark', units: 'in', zone: 'Europe/Lisbon' });
    expect(
      read({ 'firstpull-theme': '"><script>', 'firstpull-units': 'ft', 'firstpull-zone': 'Mars/Olympus' }),
    ).toEqual({ theme: 'system', units: 'mm', zone: null });
  });
});
