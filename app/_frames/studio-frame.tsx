import type { ReactNode } from 'react';
import { AppShell, type Crumb } from '@/app/_components/app-shell';
import type { StudioContext } from '@/lib/auth/context';
import { spacesOf } from './spaces';

type Props = {
  ctx: StudioContext;
  page: 'workspaces' | 'people' | 'library';
  crumbs?: readonly Crumb[];
  children: ReactNode;
};

/** Frame of every page of a studio. */
export async function StudioFrame({ ctx, page, crumbs = [], children }: Props) {
  const home = `/studio/${ctx.studio.slug}`;
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
        item('Workspaces', 'workspaces', ''),
        item('People', 'people', '/people'),
        item('Library', 'library', '/library'),
      ]}
    >
      {children}
    </AppShell>
  );
}
