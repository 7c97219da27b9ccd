import { describe, expect, it } from 'vitest';
import {
  closedBecause,
  invitationSchema,
  roleInWords,
  type Invitation,
} from '@/app/(public)/join/[invitation]/invitation';
import { roles } from '@/lib/workspaces/roles';

const now = Date.parse('2026-07-03T12:00:00Z');
const open: Invitation = {
  workspaceName: 'Quillon Patisserie',
  studioName: 'Halden Forms',
  role: 'approver',
  email: 'ada@quillon.example',
  expiresAt: '2026-07-10T12:00:00Z',
  state: 'pending',
  hasAccount: false,
};

describe('an invitation', () => {
  it('is open until the moment it runs out', () => {
    expect(closedBecause(open, now)).toBeNull();
    expect(closedBecause(open, Date.parse(open.expiresAt) - 1)).toBeNull();
    expect(closedBecause(open, Date.parse(open.expiresAt))).toContain('run out');
  });

  it.each([
    ['accepted', 'taken up already'],
    ['cancelled', 'taken it back'],
    ['expired', 'run out'],
  ] as const)('that is %s says so', (state, words) => {
    expect(closedBecause({ ...open, state }, now)).toContain(words);
  });

  it('of a studio has no workspace', () => {
    expect(invitationSchema.parse({ ...open, workspaceName: null }).workspaceName).toBeNull();
    expect(() => invitationSchema.parse({ ...open, email: undefined })).toThrow();
  });

  it('says in words what every role may do', () => {
    const words = roles.map(roleInWords);
    expect(new Set(words).size).toBe(roles.length);
    for (const word of words) expect(word).toMatch(/^[a-z].*[a-z]$/);
  });
});
