import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { currentPerson } from '@/lib/auth/session';
import { safePath } from '../../_components/safe-path';
import { StatusWord } from '../../_components/status-word';
import { NarrowPage } from '../_components/narrow-page';
import { SignInForm } from './sign-in-form';

export const metadata: Metadata = { title: 'Sign in' };

type Search = Promise<{ next?: string | string[]; email?: string | string[]; password?: string | string[] }>;

export default async function SignInPage({ searchParams }: { searchParams: Search }) {
  const { next, email, password } = await searchParams;
  const path = safePath(next);
  if (await currentPerson()) redirect(path);
  return (
    <NarrowPage title="Sign in">
      {password === 'set' ? (
        <p role="status" className="mb-4 border border-l-4 border-rule border-l-verdigris bg-sheet px-4 py-3">
          <StatusWord state="done" word="Your password is set. Sign in with it." />
        </p>
      ) : null}
      <SignInForm next={path} email={typeof email === 'string' ? email : ''} />
    </NarrowPage>
  );
}
