import { conflict } from '@/lib/errors/app-error';
import type { InvitationView } from './schemas';

type Stored = { status: 'pending' | 'accepted' | 'rejected' | 'canceled'; expiresAt: Date };

export function invitationState(stored: Stored, now = new Date()): InvitationView['state'] {
  if (stored.status === 'accepted') return 'accepted';
  if (stored.status !== 'pending') return 'cancelled';
  return stored.expiresAt > now ? 'pending' : 'expired';
}

/** @throws conflict `invitation-used`, `invitation-cancelled` or `invitation-expired` */
export function refuseClosed(stored: Stored): void {
  const state = invitationState(stored);
  if (state === 'accepted') throw conflict('invitation-used', 'This invitation was already accepted.');
  if (state === 'cancelled')
    throw conflict('invitation-cancelled', 'This invitation was taken back. Ask the studio for a new one.');
  if (state === 'expired')
    throw conflict('invitation-expired', 'This invitation has run out. Ask the studio for a new one.');
}
