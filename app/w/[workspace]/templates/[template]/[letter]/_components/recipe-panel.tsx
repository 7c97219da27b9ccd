'use client';

import { Disclosure } from '@/app/_components/disclosure';
import { recipeLines } from '@/lib/review/recipe-lines';
import type { RevisionView } from '@/lib/review/schemas';
import { RecipeList } from './recipe-list';

/** The recipe that this revision was posted and judged under, every value with its unit; folded away at first. */
export function RecipePanel({ recipe }: Pick<RevisionView, 'recipe'>) {
  return (
    <div className="border-b border-rule print:[&_[hidden]]:block print:[&_[hidden]]:[content-visibility:visible]">
      <Disclosure
        level={2}
        title={
          <span>
            Recipe <span className="font-normal text-slate">how it is printed and formed, as posted</span>
          </span>
        }
      >
        <RecipeList lines={recipeLines(recipe)} />
      </Disclosure>
    </div>
  );
}
