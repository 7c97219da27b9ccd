import type { RevisionView } from '@/lib/review/schemas';

/** The words that the author posted the revision with. */
export function PostedWith({ revision }: { revision: RevisionView }) {
  if (!revision.note) return null;
  return (
    <p className="max-w-prose py-1 text-base whitespace-pre-line">
      <span className="text-slate">{revision.author.name} writes: </span>
      {revision.note}
    </p>
  );
}
