import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { readForm } from '@/lib/http/read-form';
import { etagOf, refuseStale, versionOf } from '@/lib/http/if-match';
import { parseInput, readJson } from '@/lib/http/read-input';

const json = 'application/json';
const request = (body: string, type = json, headers: Record<string, string> = {}) =>
  new Request('http://x.test/', { method: 'POST', body, headers: { 'content-type': type, ...headers } });
const errorOf = async (work: () => unknown) => {
  try {
    return await work();
  } catch (error) {
    const { code, reason } = error as { code: string; reason: string };
    return `${code}/${reason}`;
  }
};

describe('readJson', () => {
  it('reads JSON, and nothing as an empty object', async () => {
    expect(await readJson(request('{"a":[1,"ü"]}', 'application/json; charset=utf-8'))).toEqual({
      a: [1, 'ü'],
    });
    expect(await readJson(request(''))).toEqual({});
  });

  it.each([
    ['plain text', request('{}', 'text/plain')],
    ['a form', request('a=1', 'application/x-www-form-urlencoded')],
    ['a type that only begins alike', request('{}', 'application/jsonp')],
    ['broken JSON', request('{"a":')],
    ['a NUL in a text', request('{"a":"x\\u0000"}')],
    ['a NUL in a name', request('{"x\\u0000":1}')],
    ['half of a character in a text', request('{"a":["x\\ud83d"]}')],
    ['half of a character in a name', request('{"\\udc00x":1}')],
    ['a prototype', request('{"__proto__":{"admin":true}}')],
    ['nesting without end', request('['.repeat(300) + ']'.repeat(300))],
  ])('refuses %s', async (_what, given) => {
    expect(await errorOf(() => readJson(given))).toBe('invalid/invalid');
  });

  it('refuses more than a megabyte, whatever the length header says', async () => {
    const big = `"${'x'.repeat(1_000_001)}"`;
    expect(await errorOf(() => readJson(request(big)))).toBe('invalid/too-large');
    expect(await errorOf(() => readJson(request('{}', json, { 'content-length': '9000000' })))).toBe(
      'invalid/too-large',
    );
  });
});

describe('parseInput', () => {
  it('points to every wrong field, with names escaped as RFC 6901 asks', () => {
    const schema = z.object({ a: z.object({ 'b/c~d': z.number() }), list: z.array(z.string()) });
    try {
      parseInput(schema, { a: { 'b/c~d': 'x' }, list: ['y', 2] });
      expect.unreachable();
    } catch (error) {
      const { errors } = error as { errors: { pointer: string }[] };
      expect(errors.map((one) => one.pointer)).toEqual(['/a/b~1c~0d', '/list/1']);
    }
  });

  it('drops what the schema does not name', () => {
    expect(parseInput(z.object({ a: z.number() }), { a: 1, role: 'lead' })).toEqual({ a: 1 });
  });
});

describe('readForm', () => {
  const form = 'application/x-www-form-urlencoded';
  it('reads fields once each', async () => {
    expect(await readForm(request('socket_id=1.2&channel_name=a%20b', form))).toEqual({
      socket_id: '1.2',
      channel_name: 'a b',
    });
    expect(await errorOf(() => readForm(request('a=1&a=2', form)))).toBe('invalid/invalid');
    expect(await errorOf(() => readForm(request('a=1', json)))).toBe('invalid/invalid');
    expect(await errorOf(() => readForm(request(`a=${'x'.repeat(5000)}`, form)))).toBe('invalid/too-large');
  });
});

describe('If-Match', () => {
  const withTag = (tag?: string) =>
    new Request('http://x.test/', { headers: tag === undefined ? {} : { 'if-match': tag } });
  it.each([
    ['"3"', 3],
    ['W/"3"', 3],
    ['3', 3],
    [etagOf(12), 12],
  ])('reads %s', (tag, version) => {
    expect(versionOf(withTag(tag))).toBe(version);
  });

  it('asks for a version that is left out (428) and refuses what is none (412)', async () => {
    expect(await errorOf(() => versionOf(withTag()))).toBe('precondition_required/precondition-required');
    for (const tag of ['*', '"x"', '"1", "2"', '-1'])
      expect(await errorOf(() => versionOf(withTag(tag)))).toBe('precondition_failed/stale');
  });

  it('refuses a version that is no longer the stored one', async () => {
    expect(await errorOf(() => refuseStale(4, 3))).toBe('precondition_failed/stale');
    expect(() => refuseStale(4, 4)).not.toThrow();
  });
});
