import { isClientOfStudio } from '@/lib/auth/auth-data';
import { claimAddress, findAccount } from '@/lib/auth/claim-address';
import type { Person } from '@/lib/auth/context';
import { enterByInvitation, holdInvitation, type HeldInvitation } from '@/lib/auth/enter-by-invitation';
import { AppError, conflict, forbidden, invalid } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { joinStudio } from '@/lib/studio/join-studio';
import { refuseClosed } from './invitation-state';
import { joinWorkspace } from './join-workspace';
import { AcceptInvitationInput } from './schemas';

export type Accepted = {
  redirectTo: string;
  /** Credentials of an account that was made just now, for signing it in; null for who was signed in. */
  signIn: { email: string; password: string } | null;
};

/**
 * Accepts an invitation once, for the address that it was mailed to. Nobody signed in: a new person gives a
 * name and a password, and the token from the mail proves the address.
 */
export async function acceptInvitation(
  visitor: Person | null,
  token: string,
  input: unknown,
): Promise<Accepted> {
  const held = await holdInvitation(token);
  const given = parseInput(AcceptInvitationInput, input);
  refuseClosed(held);
  const person = visitor ?? (await newPerson(held, given));
  const ctx = enterByInvitation(person, held);
  if (!ctx)
    throw forbidden(
      `This invitation is for ${held.email}; you are signed in as ${person.email}. Sign out and open the link again.`,
      'wrong-address',
    );
  const signIn = visitor ? null : { email: held.email, password: given.password! };
  if (held.kind === 'workspace') {
    await joinWorkspace(ctx, held);
    return { redirectTo: `/w/${held.workspace.slug}`, signIn };
  }
  if (await isClientOfStudio(person.id, held.studio.id))
    throw conflict(
      'client-of-studio',
      `You are a client in a workspace of ${held.studio.name}; clients cannot be its staff too.`,
    );
  await joinStudio(ctx, held);
  return { redirectTo: `/studio/${held.studio.slug}`, signIn };
}

async function newPerson(held: HeldInvitation, given: AcceptInvitationInput): Promise<Person> {
  const account = await findAccount(held.email);
  if (account?.emailVerified)
    throw new AppError('unauthenticated', `Sign in as ${held.email}, then open the link again.`);
  const missing = [
    ...(given.name
      ? []
      : [{ pointer: '/name', detail: 'Give your name, as it is printed beside a signature.' }]),
    ...(given.password ? [] : [{ pointer: '/password', detail: 'Choose a password.' }]),
  ];
  if (missing.length) throw invalid('A new account needs a name and a password.', missing);
  return claimAddress({
    email: held.email,
    name: given.name!,
    password: given.password!,
    timeZone: given.timeZone,
  });
}
