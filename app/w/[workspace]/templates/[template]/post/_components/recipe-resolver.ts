import { schemaResolver } from '@/app/_components/schema-resolver';
import { emptiedFigures } from './emptied-figures';

/**
 * The engine's own schema judges the form, so that what the form takes the engine takes. The engine fills what is
 * missing; a person who empties a field is asked for a figure instead, so that nothing they cannot see is frozen.
 */
export const recipeResolver = schemaResolver(async () => {
  const { recipeSchema } = await import('@/lib/formability/recipe-schema');
  return recipeSchema.superRefine((recipe, context) => {
    for (const path of emptiedFigures(recipe))
      context.addIssue({ code: 'custom', path, message: 'Write a figure.' });
  });
});
