import { zonedTime } from '@/lib/time/zoned-time';
import type { MailRequest } from '../messages';
import { oneLine, type MailContent } from './content';

type Of<T extends MailRequest['template']> = Extract<MailRequest, { template: T }>;

export function verifyAddress({ to, url }: Of<'verify-address'>): MailContent {
  return {
    subject: 'Confirm your address for Firstpull',
    heading: 'Confirm your address',
    preview: 'One step, then you can sign in.',
    paragraphs: [
      `Hello ${to.name},`,
      'somebody, we think you, opened an account at Firstpull with this address. Confirm it and you can sign in. The link works for one hour and only once.',
    ],
    facts: [],
    action: { label: 'Confirm this address', url },
    footer: 'If it was not you, do nothing: without this step the account stays closed.',
  };
}

export function resetPassword({ to, url }: Of<'reset-password'>): MailContent {
  return {
    subject: 'Set a new password for Firstpull',
    heading: 'Set a new password',
    preview: 'You, or somebody, asked for a new password.',
    paragraphs: [
      `Hello ${to.name},`,
      'here is the link to set a new password. It works for one hour and only once. Setting it ends all other sessions of yours.',
    ],
    facts: [],
    action: { label: 'Set a new password', url },
    footer: 'If you did not ask for this, do nothing: your password stays as it is.',
  };
}

const changes = {
  on: [
    'Your second factor is on',
    'From now on signing in, and signing a gate, asks for a code of your authenticator besides the password. Your other sessions have ended.',
  ],
  off: ['Your second factor is off', 'Signing in and signing a gate ask for the password alone again.'],
  'new-codes': ['You have new recovery codes', 'Those of before no longer work.'],
  'code-spent': ['A recovery code was used to sign in', 'It does not work a second time.'],
} as const;

export function secondFactor({ what, codesLeft }: Of<'second-factor'>, url: string): MailContent {
  const [heading, said] = changes[what];
  return {
    subject: `${heading} at Firstpull`,
    heading,
    preview: said,
    paragraphs: [said],
    facts: what === 'code-spent' ? [{ label: 'Codes left', value: String(codesLeft) }] : [],
    action: { label: 'See your account', url },
    // A new password alone would not help against a factor that somebody else has set up.
    footer:
      what === 'on'
        ? 'If it was not you, somebody has your password and can sign as you: tell a lead of the studio at once, who takes this address out and invites another one of yours.'
        : 'If it was not you, set a new password now: it ends all sessions. Then end what you do not know.',
  };
}

const roleWords: Record<string, string> = {
  designer: 'designer: posts revisions and answers notes',
  lead: 'lead: runs workspaces, invites people, signs for the studio',
  producer: 'producer: releases what is approved and makes it',
  reviewer: 'reviewer: looks and comments',
  approver: 'approver: looks, comments, and signs or returns',
};

export function invitation(
  { to, inviterName, studioName, workspaceName, role, expiresAt }: Of<'invitation'>,
  url: string,
): MailContent {
  const place = workspaceName ? `${workspaceName} at ${studioName}` : studioName;
  return {
    subject: oneLine(`${inviterName} invites you to ${place}`),
    heading: `${inviterName} invites you to ${place}`,
    preview: 'Open the invitation to see what it gives you.',
    paragraphs: [
      workspaceName
        ? `${studioName} settles forming templates with ${workspaceName} here: look at each revision, say what must change, and sign what is right.`
        : `${studioName} settles its forming templates with its clients here, from the first revision to release.`,
    ],
    facts: [
      { label: 'Your part', value: roleWords[role] ?? role },
      { label: 'For', value: to.email },
      { label: 'Open until', value: zonedTime(expiresAt, 'UTC') },
    ],
    action: { label: 'See the invitation', url },
    footer: 'The link is for you alone. If you do not know who sent it, do nothing: it ends by itself.',
  };
}
