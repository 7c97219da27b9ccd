'use client';

import { useEffect } from 'react';
import { revisionChannel } from '@/realtime/channels';
import { useLive } from './live-provider';

/** Shows the reader among those who have this revision open, for as long as the page is. */
export function usePresence(workspaceId: string, revisionId: string): void {
  const { connection, showPeople } = useLive();
  useEffect(() => {
    if (!connection) return;
    const leave = connection.join(revisionChannel(workspaceId, revisionId), showPeople);
    return () => {
      leave();
      showPeople([]);
    };
  }, [connection, workspaceId, revisionId, showPeople]);
}
