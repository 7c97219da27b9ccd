import { beforeAll, describe, expect, it } from 'vitest';
import { AppError, errorCodes, notFound } from '@/lib/errors/app-error';
import { fromUnknown } from '@/lib/errors/from-unknown';
import { statusOf } from '@/lib/errors/status';
import { problemResponse } from '@/lib/http/problem';
import { setEnvironment } from '@/tests/support/test-environment';

beforeAll(() => {
  setEnvironment({ LOG_LEVEL: 'silent' });
});

const postgres = (code: string, constraint?: string) =>
  Object.assign(new Error('query failed'), {
    cause: Object.assign(new Error('secret detail'), { code, constraint }),
  });

describe('problemResponse', () => {
  it.each(errorCodes)('answers %s with its one status, as RFC 9457 asks', async (code) => {
    const answer = problemResponse(new AppError(code, 'What happened.', { reason: 'a-reason' }), 'ref');
    expect(answer.status).toBe(statusOf[code]);
    expect(answer.headers.get('content-type')).toBe('application/problem+json; charset=utf-8');
    expect(answer.headers.get('cache-control')).toBe('private, no-store');
    expect(await answer.json()).toMatchObject({
      type: '/problems/a-reason',
      status: statusOf[code],
      detail: 'What happened.',
      reference: 'ref',
    });
  });

  it('tells nothing of an error that is ours', async () => {
    const answer = problemResponse(new Error('password=hunter2 at /srv/app/db.ts:12'), 'ref');
    const text = await answer.text();
    expect(answer.status).toBe(500);
    expect(text).not.toMatch(/hunter2|srv|stack/);
    expect(text).toContain('ref');
  });

  it('says how long to wait', () => {
    const answer = problemResponse(new AppError('limit_exceeded', 'Wait.', { retryAfterS: 60 }), 'ref');
    expect(answer.headers.get('retry-after')).toBe('60');
  });

  it('never says whether a thing is foreign or missing', () => {
    expect(notFound('revision').message).not.toMatch(/allow|permission|belong/);
  });
});

describe('fromUnknown', () => {
  it.each([
    ['23001', 'locked', 'conflict', 'revision-locked'],
    ['23001', 'frozen', 'conflict', 'frozen'],
    ['23514', 'revision_life', 'conflict', 'wrong-state'],
    ['23514', 'studio_keeps_a_lead', 'conflict', 'last-lead'],
    ['23505', 'members_one', 'conflict', 'already-member'],
    ['23505', 'machines_name', 'conflict', 'already-there'],
    ['40P01', undefined, 'conflict', 'try-again'],
    ['40001', undefined, 'conflict', 'try-again'],
    ['57014', undefined, 'unavailable', 'unavailable'],
    ['57P01', undefined, 'unavailable', 'unavailable'],
    ['53300', undefined, 'unavailable', 'unavailable'],
    ['08006', undefined, 'unavailable', 'unavailable'],
    ['42501', undefined, 'internal', 'internal'],
    ['42P01', undefined, 'internal', 'internal'],
  ])('turns PostgreSQL’s %s (%s) into %s %s', (code, constraint, expected, reason) => {
    const error = fromUnknown(postgres(code, constraint));
    expect({ code: error.code, reason: error.reason }).toEqual({ code: expected, reason });
    expect(error.message).not.toContain('secret detail');
  });

  it.each([
    Object.assign(new Error('connect'), { code: 'ECONNREFUSED' }),
    new Error('outer', { cause: new Error('timeout exceeded when trying to connect') }),
    new Error('Connection terminated unexpectedly'),
  ])('calls a service that does not answer unavailable: %s', (error) => {
    expect(fromUnknown(error)).toMatchObject({ code: 'unavailable', retryAfterS: 5 });
  });

  it('leaves our own errors as they are', () => {
    const own = notFound('template');
    expect(fromUnknown(own)).toBe(own);
  });
});
