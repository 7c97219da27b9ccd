'use client';

import { useRouter } from 'next/navigation';
import { useEffect } from 'react';
import type { LiveEventName } from '@/realtime/events';
import { useLive } from './live-provider';

/** Several events of one transaction come together; the page is fetched once for all of them. */
const gatherMs = 200;

/** Fetches a server-rendered page again when one of `events` arrives, after a reconnect, and while polling. */
export function RefreshOnLive({ events }: { events: readonly LiveEventName[] }) {
  const router = useRouter();
  const { listen } = useLive();
  const wanted = events.join(' ');
  useEffect(() => {
    let timer: number | undefined;
    const stop = listen((news) => {
      if (news.name !== 'anything' && !wanted.split(' ').includes(news.name)) return;
      window.clearTimeout(timer);
      timer = window.setTimeout(() => router.refresh(), gatherMs);
    });
    return () => {
      window.clearTimeout(timer);
      stop();
    };
  }, [listen, router, wanted]);
  return null;
}
