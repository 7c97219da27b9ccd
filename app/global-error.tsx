'use client';

import { StateShape } from './_components/state-shape';
import './globals.css';

/** The root layout itself failed, so nothing of it may be used here. */
export default function GlobalError({
  error,
  reset,
}: {
  error: Error & { digest?: string };
  reset: () => void;
}) {
  return (
    <html lang="en">
      <body>
        <title>Not available · Firstpull</title>
        <main className="mx-auto max-w-2xl px-4 py-16">
          <h1 className="flex items-baseline gap-2 text-xl font-semibold">
            <StateShape shape="triangle" className="size-4 text-madder" />
            Firstpull is not available for the moment
          </h1>
          <p className="mt-2">
            The server could not make this page. What you had sent before is kept. Wait a minute and try
            again.
          </p>
          {error.digest ? (
            <p className="mt-2 text-sm text-slate">
              Reference <code>{error.digest}</code>
            </p>
          ) : null}
          <button
            type="button"
            onClick={reset}
            className="mt-5 border border-ink bg-sheet px-4 py-2 font-semibold"
          >
            Try again
          </button>
        </main>
      </body>
    </html>
  );
}
