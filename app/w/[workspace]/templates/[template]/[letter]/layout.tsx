import { notFound } from 'next/navigation';
import type { ReactNode } from 'react';
import { enterWorkspacePage, orNotFound } from '@/app/_frames/enter-page';
import { listRevisions } from '@/lib/review/list-revisions';

type Props = {
  params: Promise<{ workspace: string; template: string; letter: string }>;
  children: ReactNode;
};

/** Answers 404 for a revision that is not there, before the page's skeleton is sent: its status cannot change after. */
export default async function RevisionLayout({ params, children }: Props) {
  const { workspace, template, letter } = await params;
  const ctx = await enterWorkspacePage(workspace);
  const revisions = await orNotFound(listRevisions(ctx, template));
  if (!revisions.some((revision) => revision.letter === letter.toUpperCase())) notFound();
  return children;
}
