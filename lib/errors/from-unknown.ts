import { AppError } from './app-error';

type PostgresError = { code?: string; constraint?: string };

function postgresErrorOf(error: unknown): PostgresError | null {
  for (let e: unknown = error, depth = 0; e && depth < 5; e = (e as { cause?: unknown }).cause, depth++) {
    const code = (e as PostgresError).code;
    if (typeof code === 'string' && /^[0-9A-Z]{5}$/.test(code)) return e as PostgresError;
  }
  return null;
}

/** The database or another service did not answer in time, or nobody listens there. */
function isUnreachable(error: unknown): boolean {
  for (let e: unknown = error, depth = 0; e && depth < 5; e = (e as { cause?: unknown }).cause, depth++) {
    const { code, message } = e as { code?: unknown; message?: unknown };
    if (typeof code === 'string' && /^(ECONNREFUSED|ECONNRESET|ETIMEDOUT|EPIPE)$/.test(code)) return true;
    if (
      typeof message === 'string' &&
      /timeout exceeded when trying to connect|Connection terminated/.test(message)
    )
      return true;
  }
  return false;
}

/** The database's refusals in words; the database is the last guard, the verbs say it better and first. */
export function fromUnknown(error: unknown): AppError {
  if (error instanceof AppError) return error;
  const pg = postgresErrorOf(error);
  const reason = pg?.constraint ?? '';
  if (pg?.code === '23001' && reason === 'locked')
    return new AppError(
      'conflict',
      'This revision is locked: nothing that was agreed changes. Post a new revision.',
      {
        reason: 'revision-locked',
        cause: error,
      },
    );
  if (pg?.code === '23001')
    return new AppError('conflict', 'This record is frozen and cannot be changed.', {
      reason: 'frozen',
      cause: error,
    });
  if (pg?.code === '23514' && reason === 'revision_life')
    return new AppError(
      'conflict',
      'The revision is not in a state that allows this. Reload to see where it stands.',
      {
        reason: 'wrong-state',
        cause: error,
      },
    );
  if (pg?.code === '23514' && reason === 'studio_keeps_a_lead')
    return new AppError('conflict', 'A studio keeps at least one lead. Make someone else a lead first.', {
      reason: 'last-lead',
      cause: error,
    });
  if (pg?.code === '23505' && reason === 'members_one')
    return new AppError(
      'conflict',
      'This person already belongs to a workspace of the studio in another role.',
      {
        reason: 'already-member',
        cause: error,
      },
    );
  if (pg?.code === '23505')
    return new AppError(
      'conflict',
      'This was already done, or the same name is taken. Reload to see what is there.',
      {
        reason: 'already-there',
        cause: error,
      },
    );
  if (pg?.code === '40P01' || pg?.code === '40001')
    return new AppError('conflict', 'Two changes met at the same moment. Nothing was changed; try again.', {
      reason: 'try-again',
      cause: error,
    });
  if (
    isUnreachable(error) ||
    pg?.code === '57014' ||
    pg?.code?.startsWith('08') ||
    pg?.code?.startsWith('57P') ||
    pg?.code?.startsWith('53')
  )
    return new AppError(
      'unavailable',
      'The database is busy or restarting. Nothing was lost; try again shortly.',
      {
        retryAfterS: 5,
        cause: error,
      },
    );
  return new AppError(
    'internal',
    'Something failed on our side. Nothing was changed; try again, and tell us the reference.',
    {
      cause: error,
    },
  );
}
