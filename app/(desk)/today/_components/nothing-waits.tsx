import type { Space } from '@/app/_components/app-shell';
import { EmptyState } from '@/app/_components/empty-state';
import { ButtonLink } from '@/app/_components/link';

/** An empty Today: what to do first at a new studio or without one, otherwise which mails will come. */
export function NothingWaits({ places }: { places: readonly Space[] }) {
  const studio = places.find(({ kind }) => kind === 'studio');
  if (places.length === 0)
    return (
      <EmptyState
        title="You do not belong to any place yet"
        level={3}
        actions={<ButtonLink href="/studio/new">Open a studio</ButtonLink>}
      >
        Open a studio of your own, or wait for an invitation: it comes by mail, and its link brings you in.
      </EmptyState>
    );
  if (studio && places.every(({ kind }) => kind === 'studio'))
    return (
      <EmptyState
        title={`${studio.name} has no workspace yet`}
        level={3}
        actions={<ButtonLink href={studio.href}>Go to {studio.name}</ButtonLink>}
      >
        Each client has a workspace of its own. A lead opens the first one on the studio’s page and invites
        people; templates live in it.
      </EmptyState>
    );
  return (
    <EmptyState title="All clear" level={3}>
      You will get a mail when a gate waits for your name, a note names you, or a check fails on what you
      posted.
    </EmptyState>
  );
}
