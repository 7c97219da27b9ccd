import type { Metadata } from 'next';
import { ButtonLink } from '../../_components/link';
import { NarrowPage } from '../_components/narrow-page';
import { ResetForm } from './reset-form';

// The token in the address must not travel on in a Referer header.
export const metadata: Metadata = { title: 'New password', referrer: 'no-referrer' };

type Search = Promise<{ token?: string | string[]; error?: string | string[] }>;

export default async function ResetPage({ searchParams }: { searchParams: Search }) {
  const { token, error } = await searchParams;
  if (typeof token !== 'string' || error) {
    return (
      <NarrowPage
        title="This link does not work any more"
        lead="It has been used, has run out, or was cut short by the mail program."
      >
        <ButtonLink href="/forgot" variant="primary">
          Ask for a new link
        </ButtonLink>
      </NarrowPage>
    );
  }
  return (
    <NarrowPage title="New password" lead="Setting it ends all your sessions, on every device.">
      <ResetForm token={token} />
    </NarrowPage>
  );
}
