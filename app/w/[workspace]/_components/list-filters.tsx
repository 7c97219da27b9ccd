'use client';

import { useRouter } from 'next/navigation';
import { useEffect, useRef, useState } from 'react';
import { Select } from '@/app/_components/select';
import { TextField } from '@/app/_components/text-field';
import { listAddress, type ListState } from './list-address';

type Props = { home: string; state: ListState };

const standings = [
  { value: 'any', label: 'Any state' },
  { value: 'draft', label: 'Draft' },
  { value: 'in_review', label: 'In review' },
  { value: 'returned', label: 'Returned' },
  { value: 'approved', label: 'Approved' },
  { value: 'released', label: 'Released' },
  { value: 'withdrawn', label: 'Withdrawn' },
  { value: 'recalled', label: 'Recalled' },
  { value: 'retired', label: 'Retired' },
];

/** Search and state of the list, kept in the address so that a link shows the same list. */
export function ListFilters({ home, state }: Props) {
  const router = useRouter();
  const [search, setSearch] = useState(state.search);
  const timer = useRef<ReturnType<typeof setTimeout> | null>(null);
  const go = (change: Partial<ListState>) =>
    router.replace(listAddress(home, state, change), { scroll: false });

  useEffect(
    () => () => {
      if (timer.current) clearTimeout(timer.current);
    },
    [],
  );

  return (
    <form
      role="search"
      className="flex flex-wrap items-end gap-4"
      onSubmit={(event) => {
        event.preventDefault();
        go({ search });
      }}
    >
      <TextField
        label="Search"
        type="search"
        className="min-w-56 flex-1 sm:max-w-80"
        value={search}
        onChange={(text) => {
          setSearch(text);
          if (timer.current) clearTimeout(timer.current);
          timer.current = setTimeout(() => go({ search: text }), 350);
        }}
      />
      <Select
        label="State"
        className="w-44"
        options={standings}
        value={state.standing ?? 'any'}
        onChange={(value) => go({ standing: value === 'any' ? undefined : value })}
      />
    </form>
  );
}
