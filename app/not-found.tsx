import type { Metadata } from 'next';
import { ButtonLink } from './_components/link';
import { PlainPage } from './_components/plain-page';

export const metadata: Metadata = { title: 'Not found' };

export default function NotFound() {
  return (
    <PlainPage>
      <h1 className="text-xl font-semibold sm:text-2xl">There is no such page here</h1>
      <p className="mt-2 max-w-prose text-base text-slate">
        The address may be incomplete, what it named may have been moved, or it belongs to a place that you do
        not have a role in. Check the address, or ask the person who sent it to you.
      </p>
      <div className="mt-5 flex flex-wrap gap-3">
        <ButtonLink href="/today" variant="primary">
          Go to Today
        </ButtonLink>
        <ButtonLink href="/sign-in">Sign in as somebody else</ButtonLink>
      </div>
    </PlainPage>
  );
}
