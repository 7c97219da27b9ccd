import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { currentPerson } from '@/lib/auth/session';
import { safePath } from '../../_components/safe-path';
import { NarrowPage } from '../_components/narrow-page';
import { SignInForm } from './sign-in-form';

export const metadata: Metadata = { title: 'Sign in' };

type Search = Promise<{ next?: string | string[]; email?: string | string[] }>;

export default async function SignInPage({ searchParams }: { searchParams: Search }) {
  const { next, email } = await searchParams;
  const path = safePath(next);
  if (await currentPerson()) redirect(path);
  return (
    <NarrowPage title="Sign in">
      <SignInForm next={path} email={typeof email === 'string' ? email : ''} />
    </NarrowPage>
  );
}
