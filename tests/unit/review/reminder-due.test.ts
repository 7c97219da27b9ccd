import { describe, expect, it } from 'vitest';
import { reminderDue } from '@/lib/review/reminder-due';

const gate = { dueOn: '2026-10-25', openedAt: new Date('2026-10-20T10:00:00Z') };
const at = (instant: string, zone: string, change = {}) =>
  reminderDue({ ...gate, ...change }, zone, new Date(instant));

describe('a reminder', () => {
  it('comes on the day before and on the day, not otherwise', () => {
    expect(at('2026-10-23T12:00:00Z', 'UTC')).toBeNull();
    expect(at('2026-10-24T12:00:00Z', 'UTC')).toBe('tomorrow');
    expect(at('2026-10-25T12:00:00Z', 'UTC')).toBe('today');
    expect(at('2026-10-26T12:00:00Z', 'UTC')).toBeNull();
  });

  it('counts days where the reader is, also where clocks change', () => {
    expect(at('2026-10-24T20:00:00Z', 'Pacific/Auckland')).toBe('today');
    expect(at('2026-10-26T01:00:00Z', 'America/New_York')).toBe('today');
    expect(at('2026-10-25T22:30:00Z', 'Europe/Berlin')).toBe('today');
    expect(at('2026-10-25T23:30:00Z', 'Europe/Berlin')).toBeNull();
  });

  it('waits for the morning', () => {
    expect(at('2026-10-24T06:59:59Z', 'UTC')).toBeNull();
    expect(at('2026-10-24T07:00:00Z', 'UTC')).toBe('tomorrow');
    expect(at('2026-10-24T00:10:00Z', 'UTC')).toBeNull();
  });

  it('is left out on the day on which the gate opened', () => {
    const openedAt = new Date('2026-10-24T08:00:00Z');
    expect(at('2026-10-24T12:00:00Z', 'UTC', { openedAt })).toBeNull();
    expect(at('2026-10-25T12:00:00Z', 'UTC', { openedAt })).toBe('today');
  });
});
