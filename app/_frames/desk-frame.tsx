import type { ReactNode } from 'react';
import { AppShell, type Crumb } from '@/app/_components/app-shell';
import type { Person } from '@/lib/auth/context';
import { spacesOf } from './spaces';

type Props = { person: Person; crumbs?: readonly Crumb[]; live?: ReactNode; children: ReactNode };

/** Frame of a person's own pages, across everything that they belong to. */
export async function DeskFrame({ person, crumbs, live, children }: Props) {
  return (
    <AppShell person={person} spaces={await spacesOf(person.id, '')} crumbs={crumbs} live={live}>
      {children}
    </AppShell>
  );
}
