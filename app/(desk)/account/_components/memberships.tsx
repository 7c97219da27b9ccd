import type { Space } from '../../../_components/app-shell';
import { EmptyState } from '../../../_components/empty-state';
import { ButtonLink, Link } from '../../../_components/link';

export function Memberships({ spaces }: { spaces: readonly Space[] }) {
  if (spaces.length === 0) {
    return (
      <EmptyState
        level={3}
        title="You do not belong to a studio or workspace yet"
        actions={<ButtonLink href="/studio/new">Open a studio</ButtonLink>}
      >
        Open the link in an invitation that was mailed to you, or ask a studio to invite your address.
      </EmptyState>
    );
  }
  return (
    <ul className="border border-rule bg-sheet">
      {spaces.map((space) => (
        <li
          key={`${space.kind}-${space.id}`}
          className="flex flex-wrap items-baseline justify-between gap-x-4 border-b border-rule px-4 py-2.5 last:border-b-0"
        >
          <span className="min-w-0">
            <Link href={space.href}>{space.name}</Link>{' '}
            <span className="text-sm text-slate">
              {space.kind === 'studio'
                ? 'studio'
                : space.studioName
                  ? `workspace of ${space.studioName}`
                  : 'workspace'}
            </span>
          </span>
          <span>{space.role}</span>
        </li>
      ))}
    </ul>
  );
}
