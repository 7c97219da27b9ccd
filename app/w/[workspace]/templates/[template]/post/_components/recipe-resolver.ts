import { zodResolver } from '@hookform/resolvers/zod';
import type { FieldValues, Resolver } from 'react-hook-form';
import { recipeSchema } from '@/lib/formability/recipe-schema';

/** The engine's own schema judges the form, so that what the form takes the engine takes. */
export const recipeResolver = zodResolver(recipeSchema) as unknown as Resolver<FieldValues>;
