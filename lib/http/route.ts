import { uuidv7 } from 'uuidv7';
import type { z } from 'zod';
import { withTenant } from '@/db/tenant';
import { digestOf } from '@/lib/audit/canonical';
import {
  personContext,
  type PersonContext,
  type StudioContext,
  type WorkspaceContext,
} from '@/lib/auth/context';
import { enterStudio, enterWorkspace } from '@/lib/auth/enter';
import { requirePerson } from '@/lib/auth/session';
import { AppError, conflict, invalid } from '@/lib/errors/app-error';
import { claimKey, dropKey, keepAnswer } from './idempotency-data';
import { problemResponse } from './problem';
import { parseInput, readJson } from './read-input';
import { requireSameOrigin } from './same-origin';

type RouteArgs = { params: Promise<Record<string, string | string[]>> };
type Handler = (request: Request, args: RouteArgs) => Promise<Response>;
type Empty = Record<string, never>;

type Declared<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType> = {
  /** Shape of the dynamic parts of the path, besides `workspace` or `studio`. */
  params?: P;
  query?: Q;
  body?: B;
  /** Creating, signing and releasing take an Idempotency-Key: the same key answers the same. */
  idempotent?: boolean;
};
type Given<C, P, Q, B> = { ctx: C; params: P; query: Q; body: B; request: Request };
type Out<T> = T extends z.ZodType ? z.output<T> : Empty;

/** JSON answer that no shared cache keeps. */
export function json(value: unknown, status = 200, headers: Record<string, string> = {}): Response {
  return Response.json(value, { status, headers: { 'cache-control': 'private, no-store', ...headers } });
}

export const noContent = () =>
  new Response(null, { status: 204, headers: { 'cache-control': 'private, no-store' } });

function makeRoute<C>(enter: (request: Request, params: Record<string, unknown>) => Promise<C>) {
  return function route<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType>(
    declared: Declared<P, Q, B>,
    handle: (given: Given<C, Out<P>, Out<Q>, Out<B>>) => Promise<Response | unknown>,
  ): Handler {
    return async (request, args) => {
      const reference = uuidv7();
      try {
        if (request.method !== 'GET' && request.method !== 'HEAD') requireSameOrigin(request);
        const raw = await args.params;
        const ctx = await enter(request, raw);
        const params = (declared.params ? parseInput(declared.params, raw) : {}) as Out<P>;
        const search = Object.fromEntries(new URL(request.url).searchParams);
        const query = (declared.query ? parseInput(declared.query, search) : {}) as Out<Q>;
        const body = (declared.body ? parseInput(declared.body, await readJson(request)) : {}) as Out<B>;
        const run = async () => {
          const answer = await handle({ ctx, params, query, body, request });
          return answer instanceof Response ? answer : json(answer);
        };
        if (!declared.idempotent) return await run();
        return await answerOnce(ctx as WorkspaceContext, request, body, run);
      } catch (error) {
        return problemResponse(error, reference);
      }
    };
  };
}

async function answerOnce(
  ctx: WorkspaceContext,
  request: Request,
  body: unknown,
  run: () => Promise<Response>,
): Promise<Response> {
  const key = request.headers.get('idempotency-key');
  if (!key || key.length > 100) throw invalid('Send an Idempotency-Key header (a UUID made by the caller).');
  const route = `${request.method} ${new URL(request.url).pathname}`;
  const where = { workspaceId: ctx.workspace.id, userId: ctx.person.id, route, key };
  // A password or code is never kept, not even as part of a hash that could be guessed at.
  const { password: _password, code: _code, ...said } = (body ?? {}) as Record<string, unknown>;
  const requestHash = digestOf(said);
  const known = await withTenant(ctx, (tx) => claimKey(tx, where, requestHash));
  if (known) {
    if (known.requestHash !== requestHash)
      throw new AppError('invalid', 'This Idempotency-Key was used for another request.', {
        reason: 'key-reused',
      });
    if (known.status === 0)
      throw conflict('still-running', 'The same request is still being worked on. Wait for its answer.');
    return json(known.response, known.status);
  }
  try {
    const response = await run();
    if (!response.ok) throw response;
    const answer = await response.clone().json();
    await withTenant(ctx, (tx) => keepAnswer(tx, where, response.status, answer));
    return response;
  } catch (error) {
    await withTenant(ctx, (tx) => dropKey(tx, where));
    if (error instanceof Response) return error;
    throw error;
  }
}

/** A route of one workspace, named in the path as `[workspace]`; the membership is read for each request. */
export const workspaceRoute = makeRoute<WorkspaceContext>(async (request, params) =>
  enterWorkspace(await requirePerson(request.headers), String(params.workspace)),
);

/** A route of one studio, named in the path as `[studio]`, for its staff. */
export const studioRoute = makeRoute<StudioContext>(async (request, params) =>
  enterStudio(await requirePerson(request.headers), String(params.studio)),
);

/** A route of the signed-in person. */
export const personRoute = makeRoute<PersonContext>(async (request) =>
  personContext(await requirePerson(request.headers)),
);

/** A route that anybody may call, e.g. to read an invitation. */
export const publicRoute = makeRoute<null>(async () => null);
