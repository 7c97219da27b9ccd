'use client';

import { useSearchParams } from 'next/navigation';
import { useEffect, useState } from 'react';
import type { DocketFilter, ItemKind } from '../_components/docket-items';

const kinds: readonly ItemKind[] = ['all', 'findings', 'notes', 'mine'];

export interface DocketAddress {
  filter: DocketFilter;
  /** Key of the item that is looked at. */
  item: string | null;
}

/** What an address says of the docket: `?q=` words, `?kind=`, `?item=`. Anything else in it is left alone. */
export function readAddress(params: URLSearchParams): DocketAddress {
  const kind = params.get('kind') as ItemKind | null;
  return {
    filter: { search: params.get('q') ?? '', kind: kind && kinds.includes(kind) ? kind : 'all' },
    item: params.get('item'),
  };
}

/** The query string that says it again; empty values leave no trace. */
export function writeAddress(current: string, { filter, item }: DocketAddress): string {
  const params = new URLSearchParams(current);
  const set = (name: string, value: string | null) => (value ? params.set(name, value) : params.delete(name));
  set('q', filter.search);
  set('kind', filter.kind === 'all' ? null : filter.kind);
  set('item', item);
  const query = params.toString();
  return query ? `?${query}` : '';
}

/** The docket's filter and the item looked at, kept in the address so that it can be sent and comes back. */
export function useDocketAddress() {
  const params = useSearchParams();
  const [address, setAddress] = useState(() => readAddress(params));
  useEffect(() => {
    const onBack = () => setAddress(readAddress(new URLSearchParams(window.location.search)));
    window.addEventListener('popstate', onBack);
    return () => window.removeEventListener('popstate', onBack);
  }, []);
  // The address follows what is on the page, never the other way: it is a moment late while somebody types.
  useEffect(() => {
    const query = writeAddress(window.location.search, address);
    if (query === window.location.search) return;
    window.history.replaceState(null, '', window.location.pathname + query);
  }, [address]);
  return {
    ...address,
    setFilter: (change: Partial<DocketFilter>) =>
      setAddress((old) => ({ ...old, filter: { ...old.filter, ...change } })),
    setItem: (item: string | null) => setAddress((old) => ({ ...old, item })),
  };
}
