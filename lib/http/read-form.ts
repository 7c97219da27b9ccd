import { AppError, invalid } from '@/lib/errors/app-error';

const maxFormBytes = 4_000;

/** Reads a small urlencoded body, as Pusher clients send it. A field that is given twice is refused. */
export async function readForm(request: Request): Promise<Record<string, string>> {
  const type = request.headers.get('content-type') ?? '';
  if (!/^application\/x-www-form-urlencoded\b/i.test(type))
    throw invalid('Send the fields as application/x-www-form-urlencoded.');
  const text = await request.text();
  if (text.length > maxFormBytes)
    throw new AppError('invalid', 'The request is larger than 4 kB.', { reason: 'too-large' });
  const fields = new URLSearchParams(text);
  for (const name of fields.keys())
    if (fields.getAll(name).length > 1) throw invalid(`The field ${name.slice(0, 40)} is given twice.`);
  return Object.fromEntries(fields);
}
