import Placeholder from '@tiptap/extension-placeholder';
import type { SuggestionOptions } from '@tiptap/suggestion';
import { extensions } from '@/lib/editor/extensions';
import type { Mentionable } from './filter-people';

export type MentionSuggestion = Omit<SuggestionOptions<Mentionable, { id: string; label: string }>, 'editor'>;

/** What a note may hold, the same as the server checks, with the parts that only an editor needs. */
export function noteExtensions(options: { placeholder: string; suggestion: MentionSuggestion }) {
  return [
    ...extensions({
      mention: {
        HTMLAttributes: { class: 'bg-verdigris-wash px-0.5 font-medium text-verdigris' },
        suggestion: options.suggestion as never,
      },
    }),
    Placeholder.configure({ placeholder: options.placeholder }),
  ];
}
