import type { Role } from '@/lib/workspaces/role-names';

/** What each role comes here to do, for whoever chooses one. */
export const roleWords: Record<Role, { label: string; help: string }> = {
  designer: {
    label: 'Designer',
    help: 'Posts revisions, answers notes, signs for the studio where they are not the author.',
  },
  lead: {
    label: 'Lead',
    help: 'Opens workspaces, invites people, sets limits, waives findings, signs, releases.',
  },
  producer: { label: 'Producer', help: 'Releases what is approved, keeps machines and materials.' },
  reviewer: { label: 'Reviewer', help: 'Looks, turns the model and comments. Does not sign.' },
  approver: { label: 'Approver', help: 'The same, and signs or returns for the client.' },
};
