import type { ErrorCode } from './app-error';

export const statusOf: Record<ErrorCode, number> = {
  invalid: 422,
  unauthenticated: 401,
  forbidden: 403,
  not_found: 404,
  conflict: 409,
  limit_exceeded: 429,
  precondition_failed: 412,
  precondition_required: 428,
  unavailable: 503,
  internal: 500,
};
