import { z } from 'zod';
import { errorCodes } from '@/lib/errors/app-error';
import { statusOf } from '@/lib/errors/status';
import { identityOperations } from './identity-operations';
import type { Operation } from './operation';
import { reviewOperations } from './review-operations';

export const operations: Operation[] = [...identityOperations, ...reviewOperations];

const Problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  detail: z.string(),
  reference: z.string(),
  errors: z.array(z.object({ pointer: z.string(), detail: z.string() })).optional(),
});

/** JSON Schema of a zod schema, as OpenAPI 3.1 takes it. */
const schemaOf = (schema: z.ZodType, io: 'input' | 'output') => {
  const { $schema: _dialect, ...rest } = z.toJSONSchema(schema, { io, unrepresentable: 'any' });
  return rest;
};
const inHeader = (name: string, description: string) => ({
  name,
  in: 'header',
  required: true,
  description,
  schema: { type: 'string' },
});

/** The HTTP API in OpenAPI 3.1, from the same zod schemas that the routes parse with. */
export function buildOpenapi(): Record<string, unknown> {
  const paths: Record<string, Record<string, unknown>> = {};
  for (const operation of operations) (paths[operation.path] ??= {})[operation.method] = describe(operation);
  return {
    openapi: '3.1.0',
    info: {
      title: 'Firstpull',
      version: '1',
      description:
        'Workspaces and studios are named by slug or id. What belongs to somebody else answers as what does not exist. Errors are problem documents (RFC 9457).',
    },
    servers: [{ url: '/api/v1' }],
    security: [{ session: [] }],
    paths,
    components: {
      securitySchemes: {
        session: { type: 'apiKey', in: 'cookie', name: 'firstpull.session_token' },
      },
      schemas: { Problem: schemaOf(Problem, 'output') },
      responses: Object.fromEntries(
        errorCodes.map((code) => [
          code,
          {
            description: `${statusOf[code]} ${code}`,
            content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
          },
        ]),
      ),
    },
  };
}

function describe(operation: Operation) {
  const { path, query, body, answer, status = 200 } = operation;
  const parts = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => ({
    name,
    in: 'path',
    required: true,
    schema: { type: 'string' },
  }));
  const asked = query
    ? (schemaOf(query, 'input') as { properties?: Record<string, unknown> }).properties
    : {};
  const parameters = [
    ...parts,
    ...Object.entries(asked ?? {}).map(([name, schema]) => ({ name, in: 'query', schema })),
    ...(operation.idempotent
      ? [inHeader('Idempotency-Key', 'A UUID of the caller; the same key answers the same.')]
      : []),
    ...(operation.versioned ? [inHeader('If-Match', 'The version that is changed, e.g. "3".')] : []),
  ];
  const media = operation.form ? 'application/x-www-form-urlencoded' : 'application/json';
  const errors = ['invalid', 'forbidden', 'not_found', 'conflict', 'limit_exceeded', 'unavailable'];
  if (!operation.open) errors.push('unauthenticated');
  if (operation.versioned) errors.push('precondition_failed', 'precondition_required');
  return {
    summary: operation.summary,
    operationId: `${operation.method}${path.replace(/[{}]/g, '').replace(/[/-](\w)/g, (_, c: string) => c.toUpperCase())}`,
    ...(operation.open ? { security: [] } : {}),
    ...(parameters.length ? { parameters } : {}),
    ...(body
      ? { requestBody: { required: true, content: { [media]: { schema: schemaOf(body, 'input') } } } }
      : {}),
    responses: {
      [status]: {
        description: operation.summary,
        ...(answer ? { content: { 'application/json': { schema: schemaOf(answer, 'output') } } } : {}),
      },
      ...Object.fromEntries(
        errors.map((code) => [
          String(statusOf[code as keyof typeof statusOf]),
          { $ref: `#/components/responses/${code}` },
        ]),
      ),
    },
  };
}
