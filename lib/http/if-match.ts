import { AppError } from '@/lib/errors/app-error';

/** The entity tag of a row with an optimistic version. */
export const etagOf = (version: number) => `"${version}"`;

/** Reads the version that a change is based on from `If-Match: "3"` (RFC 9110 §13.1.1). */
export function versionOf(request: Request): number {
  const header = request.headers.get('if-match');
  if (!header)
    throw new AppError('precondition_required', 'Say in If-Match which version you change, e.g. "3".');
  const match = /^(?:W\/)?"?(\d{1,9})"?$/.exec(header.trim());
  if (!match) throw stale();
  return Number(match[1]);
}

/** @throws precondition_failed when the stored version is another one */
export function refuseStale(stored: number, seen: number): void {
  if (stored !== seen) throw stale();
}

const stale = () =>
  new AppError(
    'precondition_failed',
    'Somebody changed this after you read it. Load it again, then make your change once more.',
    { reason: 'stale' },
  );
