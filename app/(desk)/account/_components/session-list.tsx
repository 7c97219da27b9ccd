'use client';

import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { authClient } from '../../../_components/auth-client';
import { Button } from '../../../_components/button';
import { ErrorState } from '../../../_components/error-state';
import { askAuth } from '../../../_components/explain-auth';
import { notify } from '../../../_components/notices';
import { Skeleton } from '../../../_components/skeleton';
import { StatusWord } from '../../../_components/status-word';
import { Time } from '../../../_components/time';
import { describeDevice } from './describe-device';

async function must<T>(call: Parameters<typeof askAuth<T>>[0]): Promise<T | null> {
  const { data, problem } = await askAuth(call);
  if (problem) throw new Error(problem);
  return data;
}

async function readSessions() {
  const [own, all] = await Promise.all([
    must(() => authClient.getSession()),
    must(() => authClient.listSessions()),
  ]);
  return (all ?? [])
    .map((session) => ({ ...session, isThis: session.id === own?.session.id }))
    .sort((a, b) => Number(b.isThis) - Number(a.isThis) || +new Date(b.updatedAt) - +new Date(a.updatedAt));
}

/** Where the person is signed in, with a way to end each and all others. */
export function SessionList() {
  const queries = useQueryClient();
  const { data, error, refetch } = useQuery({ queryKey: ['sessions'], queryFn: readSessions, retry: false });
  const end = useMutation({
    mutationFn: (token: string | null) =>
      token === null
        ? must(() => authClient.revokeOtherSessions())
        : must(() => authClient.revokeSession({ token })),
    onSuccess: (_, token) =>
      notify(token === null ? 'All other sessions have ended.' : 'The session has ended.'),
    onError: (failure) => notify(failure.message, { kind: 'trouble' }),
    onSettled: () => queries.invalidateQueries({ queryKey: ['sessions'] }),
  });

  if (error) {
    return (
      <ErrorState
        level={3}
        title="Your sessions could not be listed"
        actions={<Button onPress={() => refetch()}>Try again</Button>}
      >
        {error.message}
      </ErrorState>
    );
  }
  if (!data) return <Skeleton lines={3} label="Loading your sessions" />;
  const others = data.filter((session) => !session.isThis);
  return (
    <div className="flex flex-col items-start gap-3">
      <ul className="w-full border border-rule bg-sheet">
        {data.map((session) => {
          const device = describeDevice(session.userAgent);
          return (
            <li
              key={session.id}
              className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2 border-b border-rule px-4 py-2.5 last:border-b-0"
            >
              <div className="min-w-0">
                <p className="font-medium">{device}</p>
                <p className="text-sm text-slate">
                  since <Time at={session.createdAt} show="moment" />, last renewed{' '}
                  <Time at={session.updatedAt} show="relative" />
                  {session.ipAddress ? `, from ${session.ipAddress}` : ''}
                </p>
              </div>
              {session.isThis ? (
                <StatusWord state="live" word="this one" />
              ) : (
                <Button
                  size="small"
                  aria-label={`End the session on ${device}`}
                  isPending={end.isPending && end.variables === session.token}
                  onPress={() => end.mutate(session.token)}
                >
                  End
                </Button>
              )}
            </li>
          );
        })}
      </ul>
      {others.length > 0 ? (
        <Button
          variant="danger"
          isPending={end.isPending && end.variables === null}
          onPress={() => end.mutate(null)}
        >
          End all {others.length} others
        </Button>
      ) : (
        <p className="text-sm text-slate">There is no other session.</p>
      )}
    </div>
  );
}
