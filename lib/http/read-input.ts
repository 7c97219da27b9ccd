import type { z } from 'zod';
import { AppError, invalid } from '@/lib/errors/app-error';

const maxBodyBytes = 1_000_000;
/** With the u flag this matches only a half that stands alone. */
const loneSurrogate = /\p{Surrogate}/u;

/** Parses with a zod schema; what does not fit is named by JSON pointer. */
export function parseInput<S extends z.ZodType>(schema: S, value: unknown): z.output<S> {
  const result = schema.safeParse(value);
  if (result.success) return result.data;
  const errors = result.error.issues.map((issue) => ({
    pointer: `/${issue.path.map((part) => String(part).replaceAll('~', '~0').replaceAll('/', '~1')).join('/')}`,
    detail: issue.message,
  }));
  throw invalid('Some of the input is not right. Each field says what it needs.', errors);
}

/** Text that PostgreSQL or UTF-8 cannot hold: NUL, and halves of a surrogate pair. */
function refuseUnstorable(value: unknown, depth = 0): void {
  if (depth > 200) throw invalid('The input is nested too deeply.');
  if (typeof value === 'string' && value.includes('\u0000'))
    throw invalid('The text holds a NUL character. Remove it.');
  if (typeof value === 'string' && loneSurrogate.test(value))
    throw invalid('The text holds half of a character (a lone surrogate). Remove it and type it again.');
  if (value && typeof value === 'object')
    for (const [key, inner] of Object.entries(value)) {
      if (key === '__proto__' || key.includes('\u0000') || loneSurrogate.test(key))
        throw invalid('The input holds a name that is not allowed.');
      refuseUnstorable(inner, depth + 1);
    }
}

/** Reads a JSON body of at most 1 MB. Bytes of models never come this way: they go straight to the store. */
export async function readJson(request: Request): Promise<unknown> {
  const type = request.headers.get('content-type') ?? '';
  if (!/^application\/json\b/i.test(type)) throw invalid('Send JSON with the content type application/json.');
  if (Number(request.headers.get('content-length') ?? 0) > maxBodyBytes)
    throw new AppError('invalid', 'The request is larger than 1 MB.', { reason: 'too-large' });
  const text = await request.text();
  if (text.length > maxBodyBytes)
    throw new AppError('invalid', 'The request is larger than 1 MB.', { reason: 'too-large' });
  let value: unknown;
  try {
    value = text === '' ? {} : JSON.parse(text);
  } catch {
    throw invalid('The body is not valid JSON.');
  }
  refuseUnstorable(value);
  return value;
}
