'use client';

import { useQueryClient } from '@tanstack/react-query';
import {
  createContext,
  use,
  useCallback,
  useEffect,
  useMemo,
  useRef,
  useState,
  useSyncExternalStore,
  type ReactNode,
} from 'react';
import { personChannel, workspaceChannel } from '@/realtime/channels';
import type { LiveEvent } from '@/realtime/events';
import { openLiveConnection, type LiveConfig, type LiveConnection, type LivePerson } from './live-connection';
import {
  jitterMs,
  liveStatusOf,
  patienceAfterLossMs,
  patienceMs,
  pollMs,
  type LiveStatus,
} from './live-status';
import { queryKeys, staleAfter } from './query-keys';
import { StaleKeys } from './stale-keys';

/** What a listener is told: one event, or that anything may have changed (reconnected, or asked on time). */
export type LiveNews = LiveEvent | { name: 'anything' };

interface LiveValue {
  status: LiveStatus;
  personId: string | null;
  workspaceId: string | null;
  connection: LiveConnection | null;
  /** Others and oneself on the page that has called `usePresence`. */
  people: readonly LivePerson[];
  showPeople: (people: readonly LivePerson[]) => void;
  listen: (listener: (news: LiveNews) => void) => () => void;
}

const LiveContext = createContext<LiveValue>({
  status: 'connecting',
  personId: null,
  workspaceId: null,
  connection: null,
  people: [],
  showPeople: () => {},
  listen: () => () => {},
});

const subscribeOnline = (listener: () => void) => {
  window.addEventListener('online', listener);
  window.addEventListener('offline', listener);
  return () => {
    window.removeEventListener('online', listener);
    window.removeEventListener('offline', listener);
  };
};

export interface LiveProviderProps {
  config: LiveConfig | null;
  personId: string;
  /** The workspace whose changes this page shows; null on the person's own pages. */
  workspaceId: string | null;
  children: ReactNode;
}

/** Keeps what the page shows fresh: at once while the realtime server answers, else by asking every 15 s. */
export function LiveProvider({ config, personId, workspaceId, children }: LiveProviderProps) {
  const queries = useQueryClient();
  const online = useSyncExternalStore(
    subscribeOnline,
    () => navigator.onLine,
    () => true,
  );
  const [subscribed, setSubscribed] = useState(false);
  const [waitedEnough, setWaitedEnough] = useState(false);
  const [connection, setConnection] = useState<LiveConnection | null>(null);
  const [people, showPeople] = useState<readonly LivePerson[]>([]);
  const wasLive = useRef(false);
  const [stale] = useState(
    () =>
      new StaleKeys({
        isFetching: (queryKey) => queries.isFetching({ queryKey }) > 0,
        invalidate: (queryKey) => void queries.invalidateQueries({ queryKey }),
        later: (run, ms) => void window.setTimeout(run, ms),
      }),
  );
  const listeners = useRef(new Set<(news: LiveNews) => void>());
  const status = liveStatusOf({ online, subscribed, waitedEnough });

  const listen = useCallback((listener: (news: LiveNews) => void) => {
    listeners.current.add(listener);
    return () => {
      listeners.current.delete(listener);
    };
  }, []);
  const tell = useCallback((news: LiveNews) => listeners.current.forEach((each) => each(news)), []);

  const askForAll = useCallback(() => {
    if (workspaceId) void queries.invalidateQueries({ queryKey: queryKeys.workspace(workspaceId) });
    void queries.invalidateQueries({ queryKey: queryKeys.today() });
    tell({ name: 'anything' });
  }, [queries, tell, workspaceId]);

  // The server makes a new object whenever it renders the layout; the address in it stays the same.
  const address = config ? JSON.stringify(config) : null;
  useEffect(() => {
    if (!address) return;
    let opened: LiveConnection | null = null;
    let over = false;
    const channels = [personChannel(personId), ...(workspaceId ? [workspaceChannel(workspaceId)] : [])];
    const onEvent = (event: LiveEvent) => {
      if (event.name === 'job.progressed') {
        const { subjectId, stage, progress } = event.data;
        queries.setQueryData(queryKeys.progress(subjectId), { stage, progress });
      }
      stale.add(staleAfter(workspaceId, event));
      tell(event);
    };
    openLiveConnection(JSON.parse(address) as LiveConfig, channels, {
      onSubscribed: setSubscribed,
      onEvent,
    }).then(
      (made) => {
        if (over) return made.close();
        opened = made;
        setConnection(made);
      },
      // The library itself could not be loaded: the page polls.
      () => setSubscribed(false),
    );
    return () => {
      over = true;
      opened?.close();
      setConnection(null);
      setSubscribed(false);
    };
  }, [address, personId, workspaceId, queries, stale, tell]);

  useEffect(() => {
    if (subscribed) {
      wasLive.current = true;
      // Whatever changed between the page's first bytes, or the loss of the socket, and now.
      const timer = window.setTimeout(askForAll, Math.random() * jitterMs);
      return () => window.clearTimeout(timer);
    }
    const patience = wasLive.current ? patienceAfterLossMs : patienceMs;
    const timer = window.setTimeout(() => setWaitedEnough(true), patience);
    return () => {
      window.clearTimeout(timer);
      setWaitedEnough(false);
    };
  }, [subscribed, askForAll]);

  useEffect(() => {
    if (status !== 'polling') return;
    const ask = () => {
      if (!document.hidden) askForAll();
    };
    ask();
    const timer = window.setInterval(ask, pollMs);
    document.addEventListener('visibilitychange', ask);
    return () => {
      window.clearInterval(timer);
      document.removeEventListener('visibilitychange', ask);
    };
  }, [status, askForAll]);

  const value = useMemo(
    () => ({ status, personId, workspaceId, connection, people, showPeople, listen }),
    [status, personId, workspaceId, connection, people, listen],
  );
  return <LiveContext value={value}>{children}</LiveContext>;
}

export function useLive(): LiveValue {
  return use(LiveContext);
}
