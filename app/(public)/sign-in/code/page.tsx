import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { currentPerson } from '@/lib/auth/session';
import { safePath } from '../../../_components/safe-path';
import { NarrowPage } from '../../_components/narrow-page';
import { CodeForm } from './code-form';

export const metadata: Metadata = { title: 'Your second factor' };

type Search = Promise<{ next?: string | string[] }>;

/** Second step of signing in, for who has a second factor: the password was right a moment ago. */
export default async function SignInCodePage({ searchParams }: { searchParams: Search }) {
  const path = safePath((await searchParams).next);
  if (await currentPerson()) redirect(path);
  return (
    <NarrowPage title="Your second factor" lead="The password was right. One more thing that only you have.">
      <CodeForm next={path} />
    </NarrowPage>
  );
}
