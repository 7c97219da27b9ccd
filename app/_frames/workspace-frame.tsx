import type { ReactNode } from 'react';
import { AppShell, type Crumb } from '@/app/_components/app-shell';
import type { WorkspaceContext } from '@/lib/auth/context';
import { spacesOf } from './spaces';

type Props = {
  ctx: WorkspaceContext;
  /** Which page of the workspace is open. */
  page: 'templates' | 'people' | 'gate-plan' | 'activity';
  crumbs?: readonly Crumb[];
  live?: ReactNode;
  wide?: boolean;
  children: ReactNode;
};

/** Frame of every page of a workspace. */
export async function WorkspaceFrame({ ctx, page, crumbs = [], live, wide, children }: Props) {
  const home = `/w/${ctx.workspace.slug}`;
  const item = (label: string, key: Props['page'], path: string) => ({
    label,
    href: `${home}${path}`,
    current: page === key,
  });
  return (
    <AppShell
      person={ctx.person}
      spaces={await spacesOf(ctx.person.id, home)}
      crumbs={crumbs}
      nav={[
        item('Templates', 'templates', ''),
        item('People', 'people', '/people'),
        item('Gate plan', 'gate-plan', '/gate-plan'),
        item('Activity', 'activity', '/activity'),
      ]}
      live={live}
      wide={wide}
    >
      {children}
    </AppShell>
  );
}
