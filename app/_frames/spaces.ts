import { cache } from 'react';
import type { Space } from '@/app/_components/app-shell';
import { listMemberships } from '@/lib/auth/auth-data';

/** Every place that a person may enter, for the switcher; read once a request. */
export const spacesOf = cache(async (personId: string, currentHref: string): Promise<Space[]> => {
  const { studios, workspaces } = await listMemberships(personId);
  const manyStudios = new Set(workspaces.map((w) => w.studioName)).size > 1;
  const spaces: Space[] = [
    ...studios.map((s) => ({
      id: s.id,
      name: s.name,
      href: `/studio/${s.slug}`,
      kind: 'studio' as const,
      role: s.role,
    })),
    ...workspaces.map((w) => ({
      id: w.id,
      name: w.name,
      href: `/w/${w.slug}`,
      kind: 'workspace' as const,
      role: w.role,
      studioName: manyStudios ? w.studioName : undefined,
    })),
  ];
  return spaces.map((space) => ({ ...space, current: space.href === currentHref }));
});
