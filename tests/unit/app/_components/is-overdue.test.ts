import { describe, expect, it } from 'vitest';
import { isOverdue } from '@/app/_components/is-overdue';
import { longestTitle, titleTooLong } from '@/app/w/[workspace]/_components/title-too-long';
import { longestTitle as held } from '@/lib/review/schemas';

const at = Date.UTC(2026, 11, 1, 3, 0);

describe('a due date', () => {
  it('is over when its day is over where the reader is', () => {
    expect(isOverdue('2026-11-30', 'in_review', 'UTC', at)).toBe(true);
    expect(isOverdue('2026-12-01', 'in_review', 'UTC', at)).toBe(false);
    // 22:00 on the day before in New York.
    expect(isOverdue('2026-11-30', 'draft', 'America/New_York', at)).toBe(false);
  });

  it('is kept once something is agreed', () => {
    expect(isOverdue('2026-01-01', 'approved', 'UTC', at)).toBe(false);
    expect(isOverdue('2026-01-01', 'released', 'UTC', at)).toBe(false);
    expect(isOverdue('2026-01-01', 'returned', 'UTC', at)).toBe(true);
    expect(isOverdue('2026-01-01', 'withdrawn', 'UTC', at)).toBe(true);
  });
});

describe('a title', () => {
  it('is told to be too long at the length that the schema refuses', () => {
    expect(longestTitle).toBe(held);
    expect(titleTooLong('T'.repeat(held))).toBeUndefined();
    expect(titleTooLong('T'.repeat(held + 1))).toBe('At most 80 characters; this has 81.');
  });
});
