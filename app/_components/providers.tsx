'use client';

import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useRouter } from 'next/navigation';
import { useState, type ReactNode } from 'react';
import { I18nProvider, RouterProvider } from 'react-aria-components';
import { ApiError } from './api-client';
import { NoticeRegion } from './notices';
import { PreferencesProvider } from './preferences-context';
import type { Preferences } from './preferences';

/** Refusals are answers; only a lost connection or an unwell server is worth asking again. */
function shouldRetry(failures: number, error: unknown): boolean {
  if (error instanceof ApiError && error.status > 0 && error.status < 500) return false;
  return failures < 2;
}

export function Providers(props: { preferences: Preferences; renderedAt: number; children: ReactNode }) {
  const router = useRouter();
  const [client] = useState(
    () => new QueryClient({ defaultOptions: { queries: { staleTime: 10_000, retry: shouldRetry } } }),
  );
  return (
    <QueryClientProvider client={client}>
      <I18nProvider locale="en-GB">
        <RouterProvider navigate={(href) => router.push(href)}>
          <PreferencesProvider initial={props.preferences} renderedAt={props.renderedAt}>
            {props.children}
            <NoticeRegion />
          </PreferencesProvider>
        </RouterProvider>
      </I18nProvider>
    </QueryClientProvider>
  );
}
