import { schemaResolver } from '@/app/_components/schema-resolver';

/** The engine's own schema judges the form, so that what the form takes the engine takes. */
export const recipeResolver = schemaResolver(
  async () => (await import('@/lib/formability/recipe-schema')).recipeSchema,
);
