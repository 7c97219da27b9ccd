import type { Metadata } from 'next';
import { cache } from 'react';
import { LiveBanner } from '@/app/_components/live/live-banner';
import { LiveCorner } from '@/app/_components/live/live-corner';
import { enterWorkspacePage, orNotFound } from '@/app/_frames/enter-page';
import { WorkspaceFrame } from '@/app/_frames/workspace-frame';
import { readSecondFactor } from '@/lib/auth/second-factor-data';
import { viewDocket } from '@/lib/review/view-docket';
import { viewRevisionByLetter } from '@/lib/review/view-revision';
import { Room } from './_components/room';

type Props = { params: Promise<{ workspace: string; template: string; letter: string }> };

const load = cache(async (workspace: string, template: string, letter: string) => {
  const ctx = await enterWorkspacePage(workspace);
  const revision = await orNotFound(viewRevisionByLetter(ctx, template, letter));
  return { ctx, revision };
});

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { workspace, template, letter } = await params;
  const { ctx, revision } = await load(workspace, template, letter);
  const { number, title } = revision.template;
  return { title: `${number} revision ${revision.letter}, ${title} · ${ctx.workspace.name}` };
}

export default async function RevisionRoomPage({ params }: Props) {
  const { workspace, template, letter } = await params;
  const { ctx, revision } = await load(workspace, template, letter);
  const [docket, factor] = await Promise.all([viewDocket(ctx, revision.id), readSecondFactor(ctx.person.id)]);
  const home = `/w/${ctx.workspace.slug}`;
  return (
    <WorkspaceFrame
      ctx={ctx}
      page="templates"
      crumbs={[
        { label: 'Templates', href: home },
        { label: revision.template.title, href: `${home}/templates/${revision.template.id}` },
        { label: `Revision ${revision.letter}` },
      ]}
      live={<LiveCorner />}
    >
      <LiveBanner />
      <Room
        key={revision.id}
        workspace={{ id: ctx.workspace.id, slug: ctx.workspace.slug, name: ctx.workspace.name }}
        reader={{ id: ctx.person.id, name: ctx.person.name, role: ctx.role, asksCode: factor.on }}
        revision={revision}
        docket={docket}
        loadedAt={new Date().getTime()}
      />
    </WorkspaceFrame>
  );
}
