import type { ZodType } from 'zod';

export type ApiErrorCode =
  | 'invalid'
  | 'unauthenticated'
  | 'forbidden'
  | 'not_found'
  | 'conflict'
  | 'limit_exceeded'
  | 'precondition_failed'
  | 'precondition_required'
  | 'unavailable'
  | 'internal'
  | 'offline';

export interface FieldProblem {
  /** RFC 6901 JSON pointer into the body that was sent, such as `/recipe/layerHeight`. */
  pointer: string;
  detail: string;
}

const codeOfStatus: Record<number, ApiErrorCode> = {
  0: 'offline',
  401: 'unauthenticated',
  403: 'forbidden',
  404: 'not_found',
  409: 'conflict',
  412: 'precondition_failed',
  413: 'limit_exceeded',
  428: 'precondition_required',
  429: 'limit_exceeded',
  502: 'unavailable',
  503: 'unavailable',
  504: 'unavailable',
};

/** A refused or failed call: an RFC 9457 problem, or `status` 0 and code `offline` when nothing answered. */
export class ApiError extends Error {
  override readonly name = 'ApiError';
  readonly code: ApiErrorCode;
  constructor(
    readonly status: number,
    readonly title: string,
    readonly detail: string,
    readonly errors: readonly FieldProblem[] = [],
    /** Finds the line in the server's log. */
    readonly reference: string | null = null,
    /** Seconds to wait before another try, from `Retry-After`. */
    readonly retryAfter: number | null = null,
    /** Stable name of the case from the problem's `type`, such as `revision-locked`. */
    readonly reason: string | null = null,
  ) {
    super(detail || title);
    this.code = codeOfStatus[status] ?? (status >= 500 ? 'internal' : 'invalid');
  }
}

export interface ApiOptions<T> {
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  /** Sent as JSON. */
  body?: unknown;
  /** One key for one intent: keep it while the same press of a button is tried again. */
  idempotencyKey?: string;
  /** The ETag that was read, so that a change made meanwhile is refused (412) and not overwritten. */
  ifMatch?: string;
  signal?: AbortSignal;
  /** Checks the answer; without it the caller vouches for `T`. */
  schema?: ZodType<T>;
}

export interface ApiAnswer<T> {
  data: T;
  etag: string | null;
  status: number;
}

/** Calls our own HTTP API and returns data with its ETag; throws `ApiError` for anything but 2xx. */
export async function requestApi<T>(path: string, options: ApiOptions<T> = {}): Promise<ApiAnswer<T>> {
  if (!path.startsWith('/api/')) throw new TypeError(`Expected a path under /api/, got "${path}".`);
  const headers = new Headers({ accept: 'application/json, application/problem+json' });
  if (options.body !== undefined) headers.set('content-type', 'application/json');
  if (options.idempotencyKey) headers.set('idempotency-key', options.idempotencyKey);
  if (options.ifMatch) headers.set('if-match', options.ifMatch);
  const response = await send(path, {
    method: options.method ?? (options.body === undefined ? 'GET' : 'POST'),
    headers,
    body: options.body === undefined ? undefined : JSON.stringify(options.body),
    credentials: 'same-origin',
    cache: 'no-store',
    signal: options.signal,
  });
  const payload = await readJson(response);
  if (!response.ok) throw problemFrom(response, payload);
  const data = options.schema ? options.schema.parse(payload) : (payload as T);
  return { data, etag: response.headers.get('etag'), status: response.status };
}

/** As `requestApi`, for callers that need only the data. */
export async function api<T>(path: string, options: ApiOptions<T> = {}): Promise<T> {
  return (await requestApi<T>(path, options)).data;
}

async function send(path: string, init: RequestInit): Promise<Response> {
  try {
    return await fetch(path, init);
  } catch (cause) {
    if (init.signal?.aborted) throw cause;
    throw new ApiError(
      0,
      'No connection',
      'The server did not answer. Nothing was changed that you can see here; check the connection and try again.',
    );
  }
}

async function readJson(response: Response): Promise<unknown> {
  const text = await response.text();
  if (!text) return null;
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}

function problemFrom(response: Response, payload: unknown): ApiError {
  const problem = isRecord(payload) ? payload : {};
  const retry = Number.parseInt(response.headers.get('retry-after') ?? '', 10);
  return new ApiError(
    response.status,
    asText(problem.title) ?? 'The request was refused',
    asText(problem.detail) ?? `The server answered ${response.status} without saying why. Try again.`,
    Array.isArray(problem.errors) ? problem.errors.filter(isFieldProblem) : [],
    asText(problem.reference) ?? response.headers.get('x-request-id'),
    Number.isFinite(retry) ? retry : null,
    asText(problem.type)?.split('/').pop() || null,
  );
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function isFieldProblem(value: unknown): value is FieldProblem {
  return isRecord(value) && typeof value.pointer === 'string' && typeof value.detail === 'string';
}

function asText(value: unknown): string | null {
  return typeof value === 'string' && value !== '' ? value : null;
}

/** A fresh Idempotency-Key (128 random bits, hex). */
export function newIdempotencyKey(): string {
  const bytes = crypto.getRandomValues(new Uint8Array(16));
  return Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');
}

/** `/recipe/layerHeight` → `recipe.layerHeight`, the way react-hook-form names a field. */
export function fieldName(pointer: string): string {
  return pointer
    .split('/')
    .slice(1)
    .map((part) => part.replaceAll('~1', '/').replaceAll('~0', '~'))
    .join('.');
}

/** What to show a person for anything that was thrown. */
export function explainError(error: unknown): { title: string; detail: string; reference: string | null } {
  if (error instanceof ApiError) {
    return { title: error.title, detail: error.detail, reference: error.reference };
  }
  return {
    title: 'This did not work',
    detail: 'Something unexpected went wrong on this page. Reload it and try again.',
    reference: null,
  };
}
