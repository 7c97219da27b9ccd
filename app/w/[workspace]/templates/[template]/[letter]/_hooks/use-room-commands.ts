'use client';

import { useMutation, useQueryClient } from '@tanstack/react-query';
import { ApiError, api, explainError } from '@/app/_components/api-client';
import { queryKeys } from '@/app/_components/live/query-keys';
import { notify } from '@/app/_components/notices';
import type { ThreadView } from '@/lib/review/schemas';
import { revisionApi, workspaceApi } from './use-room-data';

/** Everything of this revision is asked for again: what was done changes docket, gates and digest alike. */
export function useRefetchRoom(workspaceId: string, revisionId: string): () => Promise<void> {
  const queries = useQueryClient();
  return async () => {
    await Promise.all(
      [
        queryKeys.revision(workspaceId, revisionId),
        queryKeys.docket(workspaceId, revisionId),
        queryKeys.content(workspaceId, revisionId),
        queryKeys.templates(workspaceId),
      ].map((queryKey) => queries.invalidateQueries({ queryKey })),
    );
  };
}

interface Settling {
  thread: ThreadView;
  settled: boolean;
  /** Called when the docket shows the change; the item has moved to another group by then. */
  onShown: () => void;
}

/** Settles a thread or opens it again; a change made meanwhile by somebody else is shown, not overwritten. */
export function useSettle(workspaceId: string, revisionId: string) {
  const refetch = useRefetchRoom(workspaceId, revisionId);
  return useMutation({
    mutationFn: ({ thread, settled }: Settling) =>
      api(`${workspaceApi(workspaceId)}/threads/${thread.id}`, {
        method: 'PATCH',
        body: { settled, version: thread.version },
      }),
    onSuccess: (_answer, { settled }) => notify(settled ? 'Settled.' : 'Open again.'),
    onError: (error) => {
      const changed = error instanceof ApiError && (error.status === 409 || error.status === 412);
      const { detail } = explainError(error);
      notify(changed ? `${detail} The docket was loaded again.` : `Nothing was changed. ${detail}`, {
        kind: 'trouble',
      });
    },
    onSettled: async (_answer, _error, { onShown }) => {
      await refetch();
      onShown();
    },
  });
}

/** Lets a failing finding stand, with a reason that stays on record. */
export function useWaive(workspaceId: string, revisionId: string) {
  const refetch = useRefetchRoom(workspaceId, revisionId);
  return useMutation({
    mutationFn: ({ findingId, reason }: { findingId: string; reason: string; onShown: () => void }) =>
      api(`${workspaceApi(workspaceId)}/findings/${findingId}/waiver`, { body: { reason } }),
    onSettled: async (_answer, _error, { onShown }) => {
      await refetch();
      onShown();
    },
  });
}

/** Orders work again that the worker had given up: the check, or the release pack. */
export function useOrderAgain(workspaceId: string, revisionId: string, what: 'check' | 'pack') {
  const refetch = useRefetchRoom(workspaceId, revisionId);
  return useMutation({
    mutationFn: () => api(`${revisionApi(workspaceId, revisionId)}/${what}`, { method: 'POST' }),
    onError: (error) => notify(explainError(error).detail, { kind: 'trouble' }),
    onSettled: refetch,
  });
}

export type Step = 'withdraw' | 'recall' | 'retire';

/** Ends a revision's way with a reason: withdrawn by its author, recalled or retired by production. */
export function useEndRevision(workspaceId: string, revisionId: string, step: Step) {
  const refetch = useRefetchRoom(workspaceId, revisionId);
  return useMutation({
    mutationFn: (reason: string) =>
      api(`${revisionApi(workspaceId, revisionId)}/${step}`, { body: { reason } }),
    onSettled: refetch,
  });
}

export function useRelease(workspaceId: string, revisionId: string) {
  const refetch = useRefetchRoom(workspaceId, revisionId);
  return useMutation({
    mutationFn: ({ note, key }: { note: string; key: string }) =>
      api(`${revisionApi(workspaceId, revisionId)}/release`, { body: { note }, idempotencyKey: key }),
    onSettled: refetch,
  });
}

export interface SignOff {
  gateId: string;
  digest: string;
  password: string;
  code?: string;
  /** Given: the revision is returned with it. */
  reason?: string;
  key: string;
}

/** Signs a gate, or returns the revision at it, for exactly the digest that was shown. */
export function useSignOff(workspaceId: string, revisionId: string) {
  const refetch = useRefetchRoom(workspaceId, revisionId);
  return useMutation({
    mutationFn: ({ gateId, digest, password, code, reason, key }: SignOff) =>
      api(`${workspaceApi(workspaceId)}/gates/${gateId}/${reason === undefined ? 'sign' : 'return'}`, {
        body: { digest, password, code, reason },
        idempotencyKey: key,
      }),
    onSuccess: refetch,
  });
}
