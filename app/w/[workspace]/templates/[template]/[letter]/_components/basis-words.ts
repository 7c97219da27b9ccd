import type { FindingView } from '@/lib/review/schemas';

const kinds: Record<string, string> = {
  'common practice': 'common practice',
  handbook: 'a handbook',
  standard: 'a standard',
  computed: 'computed from mesh and recipe',
};

/** What a limit rests on: its source, and of which kind that is where the source does not say so itself. */
export function basisWords({ source, kind }: FindingView['basis']): string {
  const word = kinds[kind];
  return !word || source.includes(word) ? source : `${source} (${word})`;
}
