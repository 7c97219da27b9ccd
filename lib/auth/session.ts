import { headers } from 'next/headers';
import { cache } from 'react';
import { AppError } from '@/lib/errors/app-error';
import { auth } from './auth';
import type { Person } from './context';

type SessionUser = {
  id: string;
  name: string;
  email: string;
  emailVerified: boolean;
  units?: unknown;
  timeZone?: unknown;
};

function personOf(user: SessionUser): Person {
  return {
    id: user.id,
    name: user.name,
    email: user.email,
    units: user.units === 'in' ? 'in' : 'mm',
    timeZone: typeof user.timeZone === 'string' ? user.timeZone : 'UTC',
  };
}

/** Who a request's cookie belongs to, read from the database each time; null for nobody. */
export async function personFromHeaders(requestHeaders: Headers): Promise<Person | null> {
  const session = await auth().api.getSession({ headers: requestHeaders });
  return session?.user.emailVerified ? personOf(session.user) : null;
}

/** The session that a request's cookie carries; null for none. */
export async function sessionIdFromHeaders(requestHeaders: Headers): Promise<string | null> {
  return (await auth().api.getSession({ headers: requestHeaders }))?.session.id ?? null;
}

/** Who is signed in, for pages and server actions; read once a request. */
export const currentPerson = cache(async (): Promise<Person | null> => personFromHeaders(await headers()));

export async function requirePerson(requestHeaders: Headers): Promise<Person> {
  const person = await personFromHeaders(requestHeaders);
  if (!person)
    throw new AppError('unauthenticated', 'Sign in to go on. What you wrote is kept on this device.');
  return person;
}
