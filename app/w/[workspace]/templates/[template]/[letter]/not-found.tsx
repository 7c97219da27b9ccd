import { EmptyState } from '@/app/_components/empty-state';
import { ButtonLink } from '@/app/_components/link';

export default function RevisionNotFound() {
  return (
    <main id="main" tabIndex={-1} className="mx-auto w-full max-w-page px-4 py-10 sm:px-6 lg:px-7">
      <h1 className="sr-only">No such revision</h1>
      <EmptyState
        title="There is no such revision here"
        actions={<ButtonLink href="/today">Go to Today</ButtonLink>}
      >
        It may never have been posted, or the address is not complete. Drafts are seen by the studio only, on
        the template’s own page.
      </EmptyState>
    </main>
  );
}
