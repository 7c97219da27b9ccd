import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { buildOpenapi, operations } from '@/lib/http/openapi/build-openapi';

const folder = path.resolve(import.meta.dirname, '../../../app/api/v1');
const verbs = /export (?:const|async function|function) (GET|POST|PUT|PATCH|DELETE)\b/g;

/** What a route's own text says of it. */
const routes = readdirSync(folder, { recursive: true, encoding: 'utf8' })
  .filter((file) => file.endsWith('route.ts'))
  .flatMap((file) => {
    const text = readFileSync(path.join(folder, file), 'utf8');
    const address = `/${path.dirname(file).replaceAll('[', '{').replaceAll(']', '}')}`;
    return [...text.matchAll(verbs)].map((match) => ({ address, method: match[1].toLowerCase(), text }));
  });
const document = buildOpenapi() as {
  openapi: string;
  paths: Record<string, Record<string, { operationId: string; parameters?: { name: string; in: string }[] }>>;
  components: { responses: Record<string, unknown>; schemas: Record<string, unknown> };
};

describe('the OpenAPI document', () => {
  it('describes every route and verb of the API, and no other', () => {
    const described = operations.map((operation) => `${operation.method} ${operation.path}`).sort();
    expect(described).toEqual(routes.map((route) => `${route.method} ${route.address}`).sort());
    expect(new Set(described).size).toBe(described.length);
  });

  it('asks for an Idempotency-Key and an If-Match exactly where a route does', () => {
    for (const { address, method, text } of routes) {
      const names = document.paths[address][method].parameters?.map((parameter) => parameter.name) ?? [];
      const own = text.slice(text.indexOf(`export const ${method.toUpperCase()}`)).split('\nexport ')[0];
      expect({ address, method, key: names.includes('Idempotency-Key') }).toEqual({
        address,
        method,
        key: own.includes('idempotent: true'),
      });
      expect({ address, method, version: names.includes('If-Match') }).toEqual({
        address,
        method,
        version: own.includes('versionOf('),
      });
    }
  });

  it('names each part of a path, and each operation once', () => {
    const ids: string[] = [];
    for (const [address, methods] of Object.entries(document.paths))
      for (const operation of Object.values(methods)) {
        const inPath = (operation.parameters ?? []).filter((parameter) => parameter.in === 'path');
        expect(inPath.map((parameter) => `{${parameter.name}}`)).toEqual(address.match(/\{\w+\}/g) ?? []);
        ids.push(operation.operationId);
      }
    expect(new Set(ids).size).toBe(ids.length);
  });

  it('is JSON whose references all lead somewhere', () => {
    const text = JSON.stringify(document);
    expect(document.openapi).toBe('3.1.0');
    const references = [...text.matchAll(/"\$ref":"#\/components\/(\w+)\/(\w+)"/g)];
    expect(references.length).toBeGreaterThan(100);
    for (const [, kind, name] of references)
      expect(Object.keys(document.components[kind as 'responses' | 'schemas'])).toContain(name);
    expect(text).not.toContain('"$schema"');
  });
});
