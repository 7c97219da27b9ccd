import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { PageHeader } from '@/app/_components/page-header';
import { enterWorkspacePage, orNotFound } from '@/app/_frames/enter-page';
import { WorkspaceFrame } from '@/app/_frames/workspace-frame';
import { enterStudio } from '@/lib/auth/enter';
import { openDraft } from '@/lib/review/open-draft';
import { viewTemplate } from '@/lib/review/view-template';
import { readLibrary } from '@/lib/studio/read-library';
import { permits } from '@/lib/workspaces/roles';
import { PostDesk } from './_components/post-desk';

type Props = { params: Promise<{ workspace: string; template: string }> };

export const metadata: Metadata = { title: 'Post a revision' };

export default async function PostPage({ params }: Props) {
  const { workspace, template: id } = await params;
  const ctx = await enterWorkspacePage(workspace);
  if (!permits(ctx.role, 'revision.post')) notFound();
  const draft = await orNotFound(openDraft(ctx, id));
  const [template, library] = await Promise.all([
    viewTemplate(ctx, id),
    enterStudio(ctx.person, ctx.studio.id).then(readLibrary),
  ]);
  const home = `/w/${ctx.workspace.slug}`;
  const here = `${home}/templates/${template.id}`;
  return (
    <WorkspaceFrame
      ctx={ctx}
      page="templates"
      crumbs={[
        { label: 'Templates', href: home },
        { label: template.title, href: here },
        { label: `Post revision ${draft.nextLetter}` },
      ]}
    >
      <PageHeader
        kicker={template.number}
        title={`${template.title}, revision ${draft.nextLetter}`}
        lead="The mesh, and how it will be printed and formed. The check run judges both together."
      />
      <PostDesk
        apiPath={`/api/v1/workspaces/${ctx.workspace.slug}`}
        roomPath={here}
        readerId={ctx.person.id}
        draft={draft}
        library={library}
      />
    </WorkspaceFrame>
  );
}
