import { AppError } from '@/lib/errors/app-error';
import { fromUnknown } from '@/lib/errors/from-unknown';
import { statusOf } from '@/lib/errors/status';
import { log } from '@/lib/log/log';

/** RFC 9457 body. `type` is stable; `reference` finds the log line. */
export type Problem = {
  type: string;
  title: string;
  status: number;
  detail: string;
  reference: string;
  errors?: { pointer: string; detail: string }[];
};

const titles: Record<AppError['code'], string> = {
  invalid: 'Some of the input is not right',
  unauthenticated: 'Sign in first',
  forbidden: 'Not allowed',
  not_found: 'Not found',
  conflict: 'This cannot be done now',
  limit_exceeded: 'Too many requests',
  precondition_failed: 'Somebody changed this meanwhile',
  precondition_required: 'Say which version you change',
  unavailable: 'Not available for the moment',
  internal: 'Something failed on our side',
};

export function problemOf(error: unknown, reference: string): { problem: Problem; appError: AppError } {
  const appError = fromUnknown(error);
  const problem: Problem = {
    type: `/problems/${appError.reason}`,
    title: titles[appError.code],
    status: statusOf[appError.code],
    detail: appError.message,
    reference,
  };
  if (appError.errors.length) problem.errors = appError.errors;
  return { problem, appError };
}

/** The response for an error; what is ours to mend is logged with its cause, what is the caller's is not. */
export function problemResponse(error: unknown, reference: string): Response {
  const { problem, appError } = problemOf(error, reference);
  if (appError.code === 'internal')
    log().error({ reference, err: appError.cause ?? appError }, 'request failed');
  else if (appError.code === 'forbidden') log().warn({ reference, reason: appError.reason }, 'refused');
  const headers = new Headers({
    'content-type': 'application/problem+json; charset=utf-8',
    'cache-control': 'private, no-store',
  });
  if (appError.retryAfterS) headers.set('retry-after', String(appError.retryAfterS));
  return new Response(JSON.stringify(problem), { status: problem.status, headers });
}
