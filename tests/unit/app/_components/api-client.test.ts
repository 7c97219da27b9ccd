import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { z } from 'zod';
import {
  api,
  ApiError,
  explainError,
  fieldName,
  newIdempotencyKey,
  requestApi,
} from '@/app/_components/api-client';

type Seen = { method?: string; url?: string; headers: IncomingMessage['headers']; body: string };

let server: Server;
let origin = '';
let answer: (response: ServerResponse) => void = () => {};
let seen: Seen | null = null;
const realFetch = globalThis.fetch;

beforeAll(async () => {
  server = createServer((request, response) => {
    const chunks: Buffer[] = [];
    request.on('data', (chunk: Buffer) => chunks.push(chunk));
    request.on('end', () => {
      const { method, url, headers } = request;
      seen = { method, url, headers, body: Buffer.concat(chunks).toString() };
      answer(response);
    });
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  origin = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  // A browser resolves a path against its page; Node has no page, so the test gives it one.
  globalThis.fetch = (input, init) => realFetch(new URL(String(input), origin), init);
});

afterEach(() => {
  seen = null;
});

afterAll(async () => {
  globalThis.fetch = realFetch;
  server.closeAllConnections();
  await new Promise((resolve) => server.close(resolve));
});

function answerJson(status: number, body: unknown, headers: Record<string, string> = {}): void {
  answer = (response) => {
    response.writeHead(status, { 'content-type': 'application/json', ...headers });
    response.end(body === undefined ? '' : JSON.stringify(body));
  };
}

async function failure(call: Promise<unknown>): Promise<ApiError> {
  const error = await call.then(
    () => null,
    (thrown: unknown) => thrown,
  );
  expect(error).toBeInstanceOf(ApiError);
  return error as ApiError;
}

describe('requestApi', () => {
  it('sends JSON with Idempotency-Key and If-Match, and returns data with its ETag', async () => {
    answerJson(201, { id: 'a' }, { etag: '"7"' });
    const body = { title: 'Tray' };
    const result = await requestApi('/api/v1/templates', { body, idempotencyKey: 'key-1', ifMatch: '"6"' });
    expect(result).toEqual({ data: { id: 'a' }, etag: '"7"', status: 201 });
    expect(seen).toMatchObject({ method: 'POST', url: '/api/v1/templates', body: JSON.stringify(body) });
    expect(seen?.headers).toMatchObject({
      'content-type': 'application/json',
      'idempotency-key': 'key-1',
      'if-match': '"6"',
    });
  });

  it('asks by GET without a body or content type', async () => {
    answerJson(200, []);
    expect(await api('/api/v1/templates')).toEqual([]);
    expect(seen?.method).toBe('GET');
    expect(seen?.headers['content-type']).toBeUndefined();
  });

  it('takes 204 as no data', async () => {
    answerJson(204, undefined);
    expect(await api('/api/v1/notes/1', { method: 'DELETE' })).toBeNull();
  });

  it('turns a problem into an ApiError with its fields', async () => {
    const errors = [{ pointer: '/recipe/layerHeight', detail: 'Write 0.05 or more.' }, { nonsense: 1 }];
    answerJson(400, {
      type: '/problems/invalid',
      title: 'Some of the input is not right',
      detail: 'Each field says what it needs.',
      reference: 'ref-1',
      errors,
    });
    const error = await failure(api('/api/v1/templates', { body: {} }));
    expect(error).toMatchObject({
      status: 400,
      code: 'invalid',
      reason: 'invalid',
      title: 'Some of the input is not right',
      reference: 'ref-1',
      errors: [errors[0]],
    });
  });

  it.each([
    [401, 'unauthenticated'],
    [403, 'forbidden'],
    [404, 'not_found'],
    [409, 'conflict'],
    [412, 'precondition_failed'],
    [428, 'precondition_required'],
    [429, 'limit_exceeded'],
    [500, 'internal'],
    [503, 'unavailable'],
  ])('names status %i %s', async (status, code) => {
    answerJson(status, { title: 't', detail: 'd' });
    expect((await failure(api('/api/v1/x'))).code).toBe(code);
  });

  it('reads Retry-After in seconds', async () => {
    answerJson(429, { title: 'Too many requests', detail: 'Wait.' }, { 'retry-after': '17' });
    expect((await failure(api('/api/v1/x'))).retryAfter).toBe(17);
  });

  it('still explains an answer that is no problem document', async () => {
    answer = (response) => {
      response.writeHead(502, { 'content-type': 'text/html' });
      response.end('<h1>Bad gateway</h1>');
    };
    const error = await failure(api('/api/v1/x'));
    expect(error).toMatchObject({ status: 502, code: 'unavailable' });
    expect(error.detail).toContain('502');
  });

  it('names a lost connection', async () => {
    answer = (response) => response.destroy();
    const error = await failure(api('/api/v1/x'));
    expect(error).toMatchObject({ status: 0, code: 'offline', title: 'No connection' });
  });

  it('lets an abort through as an abort', async () => {
    answer = () => {};
    const controller = new AbortController();
    const call = api('/api/v1/x', { signal: controller.signal });
    controller.abort();
    await expect(call).rejects.toMatchObject({ name: 'AbortError' });
  });

  it('checks the answer against a schema', async () => {
    answerJson(200, { count: 'three' });
    await expect(api('/api/v1/x', { schema: z.object({ count: z.number() }) })).rejects.toThrow(/number/);
  });

  it('refuses any address but our own API', async () => {
    await expect(api('https://evil.example/api/')).rejects.toThrow(TypeError);
    await expect(api('//evil.example')).rejects.toThrow(TypeError);
  });
});

describe('helpers', () => {
  it('names fields the way forms do', () => {
    expect(fieldName('/recipe/layerHeight')).toBe('recipe.layerHeight');
    expect(fieldName('/a~1b/c~0d')).toBe('a/b.c~d');
    expect(fieldName('')).toBe('');
  });

  it('makes keys of 128 bits that differ', () => {
    const keys = new Set(Array.from({ length: 200 }, newIdempotencyKey));
    expect(keys.size).toBe(200);
    for (const key of keys) expect(key).toMatch(/^[0-9a-f]{32}$/);
  });

  it('explains a stranger error without its inner words', () => {
    expect(explainError(new Error('select * from users')).detail).not.toContain('select');
  });
});
