import { describe, expect, it } from 'vitest';
import {
  CreateWorkspaceInput,
  InviteClientInput,
  InviteStaffInput,
  UpdateMeInput,
} from '@/lib/workspaces/schemas';

describe('inputs of people and workspaces', () => {
  it.each(['designer', 'lead', 'producer', 'owner', ''])('refuse the role %j for a client', (role) => {
    expect(InviteClientInput.safeParse({ email: 'a@example.test', role }).success).toBe(false);
  });

  it.each(['reviewer', 'approver', 'admin', ''])('refuse the role %j for staff', (role) => {
    expect(InviteStaffInput.safeParse({ email: 'a@example.test', role }).success).toBe(false);
  });

  it('keep addresses in small letters, so that one person is one address', () => {
    expect(InviteClientInput.parse({ email: 'Ada@Example.TEST', role: 'approver' }).email).toBe(
      'ada@example.test',
    );
  });

  it.each(['a', 'ABCDE', 'Ab', 'A1', '', 'ÄB'])('refuse the code %j', (code) => {
    expect(CreateWorkspaceInput.safeParse({ name: 'Firm', code }).success).toBe(false);
  });

  it.each([
    ['line breaks', 'Ada\nLead'],
    ['text that turns its direction', 'Ada \u202Edael'],
    ['nothing but spaces', '   '],
    ['more than 80 characters', 'a'.repeat(81)],
  ])('refuse a name with %s', (_what, name) => {
    expect(UpdateMeInput.safeParse({ name }).success).toBe(false);
  });

  it('take IANA time zones and no others', () => {
    expect(UpdateMeInput.safeParse({ timeZone: 'Asia/Kathmandu' }).success).toBe(true);
    expect(UpdateMeInput.safeParse({ timeZone: 'Mars/Olympus' }).success).toBe(false);
  });

  it('refuse a change of nothing', () => {
    expect(UpdateMeInput.safeParse({}).success).toBe(false);
  });
});
