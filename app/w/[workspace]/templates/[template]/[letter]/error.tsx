'use client';

import { Button } from '@/app/_components/button';
import { ErrorState } from '@/app/_components/error-state';
import { Link } from '@/app/_components/link';

/** The room could not be shown: what happened, and that nothing written is lost. */
export default function RoomError({
  error,
  reset,
}: {
  error: Error & { digest?: string };
  reset: () => void;
}) {
  return (
    <main id="main" tabIndex={-1} className="mx-auto w-full max-w-page px-4 py-10 sm:px-6 lg:px-7">
      <ErrorState
        level={1}
        title="This revision could not be shown"
        reference={error.digest}
        actions={
          <>
            <Button variant="primary" onPress={reset}>
              Try again
            </Button>
            <Link href="/today" className="self-center">
              Go to Today
            </Link>
          </>
        }
      >
        Something failed on the way. Nothing was changed, and notes that you were writing are kept on this
        device.
      </ErrorState>
    </main>
  );
}
