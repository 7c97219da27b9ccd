'use client';

import { useQuery } from '@tanstack/react-query';
import { z } from 'zod';
import { api } from '@/app/_components/api-client';
import { queryKeys } from '@/app/_components/live/query-keys';
import type { Mentionable } from '@/app/_components/note-editor/filter-people';
import { ContentView, DocketView, RevisionView } from '@/lib/review/schemas';

export const workspaceApi = (workspaceId: string) => `/api/v1/workspaces/${workspaceId}`;
export const revisionApi = (workspaceId: string, revisionId: string) =>
  `${workspaceApi(workspaceId)}/revisions/${revisionId}`;

/** The revision as the server rendered it, kept fresh afterwards. */
export function useRevision(workspaceId: string, initial: RevisionView, loadedAt: number) {
  return useQuery({
    queryKey: queryKeys.revision(workspaceId, initial.id),
    queryFn: ({ signal }) => api(revisionApi(workspaceId, initial.id), { schema: RevisionView, signal }),
    initialData: initial,
    initialDataUpdatedAt: loadedAt,
  });
}

export function useDocket(workspaceId: string, initial: DocketView, loadedAt: number) {
  return useQuery({
    queryKey: queryKeys.docket(workspaceId, initial.revisionId),
    queryFn: ({ signal }) =>
      api(`${revisionApi(workspaceId, initial.revisionId)}/docket`, { schema: DocketView, signal }),
    initialData: initial,
    initialDataUpdatedAt: loadedAt,
  });
}

const People = z.object({
  people: z.array(z.object({ id: z.string(), name: z.string(), side: z.enum(['studio', 'client']) })),
});

/** Who can be mentioned; nobody until the list has come, which never keeps anybody from writing. */
export function usePeople(workspaceId: string): readonly Mentionable[] {
  const { data } = useQuery({
    queryKey: queryKeys.people(workspaceId),
    queryFn: ({ signal }) => api(`${workspaceApi(workspaceId)}/people`, { schema: People, signal }),
    staleTime: 5 * 60_000,
  });
  return data?.people ?? nobody;
}
/** Vents as the check measured them, for the section; none until the report is there. */
const Vents = z.object({
  vents: z.array(z.object({ at: z.tuple([z.number(), z.number(), z.number()]), diameterMm: z.number() })),
});

export function useVents(workspaceId: string, revision: RevisionView) {
  const { data } = useQuery({
    queryKey: queryKeys.report(workspaceId, revision.id),
    queryFn: ({ signal }) =>
      api(`${revisionApi(workspaceId, revision.id)}/report`, { schema: Vents, signal }),
    enabled: revision.check.state === 'finished' && revision.model !== null,
    staleTime: Infinity,
  });
  return data?.vents ?? noVents;
}
const noVents: z.infer<typeof Vents>['vents'] = [];
const nobody: readonly Mentionable[] = [];

/** Exactly what a signer would put their name to now; always asked afresh when the dialog opens. */
export function useContent(workspaceId: string, revisionId: string, enabled: boolean) {
  return useQuery({
    queryKey: queryKeys.content(workspaceId, revisionId),
    queryFn: ({ signal }) =>
      api(`${revisionApi(workspaceId, revisionId)}/content`, { schema: ContentView, signal }),
    enabled,
    staleTime: 0,
    gcTime: 0,
  });
}

/** Stage and share of the check that runs, as the live events tell it. */
export function useCheckProgress(revision: RevisionView): { stage: string | null; progress: number } {
  const { data } = useQuery<{ stage: string; progress: number } | null>({
    queryKey: queryKeys.progress(revision.id),
    queryFn: () => null,
    enabled: false,
  });
  return data ?? { stage: revision.check.stage, progress: revision.check.progress };
}
