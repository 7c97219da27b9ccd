import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { EnvironmentError, readEnvironment } from '@/lib/env/read-environment';

const schema = z.object({
  STORE: z.url({ protocol: /^https?$/, error: 'must be an address' }),
  SECRET: z.string().min(32, 'must have at least 32 characters'),
  PORT: z.coerce.number('must be a port number').int().default(80),
  NOTE: z.string().optional(),
});
const good = { STORE: 'http://127.0.0.1:1', SECRET: 'x'.repeat(32) };

function refusal(source: Record<string, string | undefined>): EnvironmentError {
  try {
    readEnvironment(schema, source);
  } catch (error) {
    if (error instanceof EnvironmentError) return error;
    throw error;
  }
  throw new Error('the environment was accepted');
}

describe('readEnvironment', () => {
  it('returns what was given and the defaults, and nothing else of the environment', () => {
    expect(readEnvironment(schema, { ...good, PATH: '/bin' })).toEqual({ ...good, PORT: 80 });
  });

  it('names every missing and every bad variable in one message', () => {
    const error = refusal({ SECRET: 'short', PORT: 'many' });
    expect(error.problems.map((one) => one.variable)).toEqual(['STORE', 'SECRET', 'PORT']);
    expect(error.message).toContain('STORE: is missing');
    expect(error.message).toContain('SECRET: must have at least 32 characters');
    expect(error.message).toContain('PORT: must be a port number');
  });

  it('counts an empty variable as missing', () => {
    expect(refusal({ ...good, STORE: '  ' }).message).toContain('STORE: is missing');
  });

  it('never repeats a value, since it may be a secret', () => {
    expect(refusal({ ...good, SECRET: 'hunter-two' }).message).not.toContain('hunter-two');
  });
});
