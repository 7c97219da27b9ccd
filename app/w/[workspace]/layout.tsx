import type { ReactNode } from 'react';
import { LiveProvider } from '@/app/_components/live/live-provider';
import { OutboxProvider } from '@/app/_components/note-editor/outbox-provider';
import { enterWorkspacePage } from '@/app/_frames/enter-page';
import { realtimeAddress } from '@/realtime/address';

type Props = { params: Promise<{ workspace: string }>; children: ReactNode };

/** Everything of one workspace: live updates, and the notes that wait to be sent. Each page brings its frame. */
export default async function WorkspaceLayout({ params, children }: Props) {
  const { workspace } = await params;
  const ctx = await enterWorkspacePage(workspace);
  return (
    <LiveProvider config={realtimeAddress()} personId={ctx.person.id} workspaceId={ctx.workspace.id}>
      <OutboxProvider personId={ctx.person.id}>{children}</OutboxProvider>
    </LiveProvider>
  );
}
