import type { z } from 'zod';

/** One message that names every missing or wrong variable; values are never repeated, they may be secrets. */
export class EnvironmentError extends Error {
  override readonly name = 'EnvironmentError';
  constructor(readonly problems: { variable: string; problem: string }[]) {
    const lines = problems.map(({ variable, problem }) => `  ${variable}: ${problem}`);
    super(
      `The environment is not complete. Set these variables and start again:\n${lines.join('\n')}\n` +
        'README.md explains each one; `npm start` sets all of them for a local run.',
    );
  }
}

/**
 * Parses `source` with `schema`. A variable that is set to nothing counts as missing.
 * @throws {EnvironmentError} names all variables that are missing or wrong
 */
export function readEnvironment<Schema extends z.ZodObject>(
  schema: Schema,
  source: Record<string, string | undefined>,
): z.output<Schema> {
  const given = Object.fromEntries(
    Object.keys(schema.shape).map((name) => [name, source[name]?.trim() ? source[name].trim() : undefined]),
  );
  const result = schema.safeParse(given);
  if (result.success) return result.data;
  const problems = new Map<string, string>();
  for (const issue of result.error.issues) {
    const variable = issue.path.join('.');
    if (!problems.has(variable))
      problems.set(variable, given[variable] === undefined ? 'is missing' : issue.message);
  }
  throw new EnvironmentError([...problems].map(([variable, problem]) => ({ variable, problem })));
}
