'use client';

import { Button } from './_components/button';
import { ErrorState } from './_components/error-state';
import { ButtonLink } from './_components/link';
import { PlainPage } from './_components/plain-page';

/** A page that failed while it was made; Next gives the digest that stands in the server's log. */
export default function PageError({
  error,
  reset,
}: {
  error: Error & { digest?: string };
  reset: () => void;
}) {
  return (
    <PlainPage>
      <ErrorState
        level={1}
        title="This page could not be shown"
        reference={error.digest}
        actions={
          <>
            <Button variant="primary" onPress={reset}>
              Try again
            </Button>
            <ButtonLink href="/today">Go to Today</ButtonLink>
          </>
        }
      >
        Something failed on our side while the page was being made. What you had sent before is kept. Try
        again; if it fails again, give the reference to whoever runs this installation.
      </ErrorState>
    </PlainPage>
  );
}
