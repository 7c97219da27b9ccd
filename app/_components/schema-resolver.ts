import type { FieldValues, Resolver } from 'react-hook-form';
import type { ZodType } from 'zod';

/**
 * Judges a form by the schema that the server holds it to. Schema and library are fetched when the form is first judged,
 * so that no page carries them before somebody writes; where they cannot be had, the server's answer judges.
 */
export function schemaResolver(load: () => Promise<ZodType>): Resolver<FieldValues> {
  const judge = () =>
    Promise.all([import('@hookform/resolvers/zod'), load()]).then(
      ([{ zodResolver }, schema]) => zodResolver(schema as never) as unknown as Resolver<FieldValues>,
    );
  return async (values, context, options) => {
    const resolver = await judge().catch(() => null);
    return resolver ? resolver(values, context, options) : { values, errors: {} };
  };
}
