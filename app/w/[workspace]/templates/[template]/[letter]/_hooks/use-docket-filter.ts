'use client';

import { usePathname, useSearchParams } from 'next/navigation';
import { useCallback } from 'react';
import type { DocketFilter, ItemKind } from '../_components/docket-items';

const kinds: readonly ItemKind[] = ['all', 'findings', 'notes', 'mine'];

/** What the address says of the docket: `?q=` words, `?kind=`, and `?item=` the one that is looked at. */
export function useDocketAddress() {
  const params = useSearchParams();
  const path = usePathname();
  const kind = params.get('kind') as ItemKind | null;
  const filter: DocketFilter = {
    search: params.get('q') ?? '',
    kind: kind && kinds.includes(kind) ? kind : 'all',
  };

  // Next keeps useSearchParams in step with history.replaceState; nothing is fetched for it.
  const replace = useCallback(
    (change: Record<string, string | null>) => {
      const next = new URLSearchParams(window.location.search);
      for (const [name, value] of Object.entries(change)) {
        if (value) next.set(name, value);
        else next.delete(name);
      }
      const query = next.toString();
      window.history.replaceState(null, '', query ? `${path}?${query}` : path);
    },
    [path],
  );

  return {
    filter,
    item: params.get('item'),
    setFilter: (next: Partial<DocketFilter>) =>
      replace({
        ...(next.search === undefined ? {} : { q: next.search }),
        ...(next.kind === undefined ? {} : { kind: next.kind === 'all' ? null : next.kind }),
      }),
    setItem: (key: string | null) => replace({ item: key }),
  };
}
