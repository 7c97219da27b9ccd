import type { Metadata } from 'next';
import { headers } from 'next/headers';
import { currentPerson } from '@/lib/auth/session';
import { ButtonLink } from './_components/link';
import { PlainPage } from './_components/plain-page';

export const metadata: Metadata = { title: 'Not found' };

/** Whoever is not signed in may only be missing that: they sign in and come back to the address. */
async function signedOutPath(): Promise<string | null> {
  try {
    if (await currentPerson()) return null;
  } catch {
    // The page must show even when nobody can be asked who reads it.
  }
  return `/sign-in?next=${encodeURIComponent((await headers()).get('x-firstpull-path') ?? '/today')}`;
}

export default async function NotFound() {
  const signIn = await signedOutPath();
  return (
    <PlainPage>
      <h1 className="text-xl font-semibold sm:text-2xl">There is no such page here</h1>
      <p className="mt-2 max-w-prose text-base text-slate">
        The address may be incomplete, what it named may have been moved, or it belongs to a place that you do
        not have a role in. Check the address, or ask the person who sent it to you.
      </p>
      <div className="mt-5 flex flex-wrap gap-3">
        {signIn ? (
          <ButtonLink href={signIn} variant="primary">
            Sign in
          </ButtonLink>
        ) : (
          <ButtonLink href="/today" variant="primary">
            Go to Today
          </ButtonLink>
        )}
      </div>
    </PlainPage>
  );
}
