import { recipeSections } from './recipe-fields';

const at = (value: unknown, path: string[]): unknown =>
  path.reduce<unknown>((inner, key) => (inner as Record<string, unknown> | null | undefined)?.[key], value);

/** Paths of the form's figures that stand empty and must not. */
export function emptiedFigures(recipe: unknown): string[][] {
  return recipeSections
    .flatMap(({ fields }) => fields)
    .filter((field) => field.kind === 'number' && !field.mayBeEmpty)
    .map(({ path }) => path.split('.'))
    .filter((path) => at(recipe, path) == null);
}
