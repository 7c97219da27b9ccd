import type { Metadata } from 'next';
import { currentPerson } from '@/lib/auth/session';
import { explainAuth } from '../../_components/explain-auth';
import { ButtonLink } from '../../_components/link';
import { safePath } from '../../_components/safe-path';
import { NarrowPage } from '../_components/narrow-page';
import { VerifyForm } from './verify-form';

export const metadata: Metadata = { title: 'Confirm your address', referrer: 'no-referrer' };

type Search = Promise<{ error?: string | string[]; next?: string | string[] }>;

/** Where the link in the confirmation mail ends: confirmed, or a way to ask for another link. */
export default async function VerifyPage({ searchParams }: { searchParams: Search }) {
  const { error, next } = await searchParams;
  const person = error ? null : await currentPerson();
  if (person) {
    return (
      <NarrowPage title="Your address is confirmed" lead={`${person.email} is yours, and you are signed in.`}>
        <ButtonLink href={safePath(next)} variant="primary">
          Go on
        </ButtonLink>
      </NarrowPage>
    );
  }
  const lead =
    typeof error === 'string'
      ? explainAuth({ code: error.toUpperCase() })
      : 'Open the link in the mail that was sent to you. If it did not come, ask for another one.';
  return (
    <NarrowPage title="Confirm your address" lead={lead}>
      <VerifyForm />
    </NarrowPage>
  );
}
