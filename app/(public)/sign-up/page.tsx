import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { currentPerson } from '@/lib/auth/session';
import { NarrowPage } from '../_components/narrow-page';
import { SignUpForm } from './sign-up-form';

export const metadata: Metadata = { title: 'Make an account' };

/** For somebody who opens a studio. Clients and staff come by invitation, which makes their account. */
export default async function SignUpPage() {
  if (await currentPerson()) redirect('/today');
  return (
    <NarrowPage
      title="Make an account"
      lead="To open a studio of your own. Invited by a studio? Then open the link in its mail instead."
    >
      <SignUpForm />
    </NarrowPage>
  );
}
