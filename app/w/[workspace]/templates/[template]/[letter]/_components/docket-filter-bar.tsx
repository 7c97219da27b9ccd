'use client';

import type { Ref } from 'react';
import { Select } from '@/app/_components/select';
import { TextField } from '@/app/_components/text-field';
import type { DocketFilter, ItemKind } from './docket-items';
import { KeysHelp } from './keys-help';

const kinds: { value: ItemKind; label: string; detail?: string }[] = [
  { value: 'all', label: 'Everything' },
  { value: 'findings', label: 'Findings', detail: 'what the check says' },
  { value: 'notes', label: 'Notes', detail: 'what people say' },
  { value: 'mine', label: 'With me', detail: 'I wrote, or am mentioned' },
];

export function DocketFilterBar(props: {
  filter: DocketFilter;
  onFilter: (change: Partial<DocketFilter>) => void;
  inputRef: Ref<HTMLInputElement>;
}) {
  const { filter, onFilter, inputRef } = props;
  return (
    <search className="flex items-end gap-2 print:hidden">
      <TextField
        ref={inputRef}
        label="Filter the docket"
        hideLabel
        type="search"
        placeholder="Filter by words"
        value={filter.search}
        onChange={(search) => onFilter({ search })}
        className="grow"
      />
      <Select
        label="Show"
        hideLabel
        options={kinds}
        value={filter.kind}
        onChange={(kind) => onFilter({ kind: kind as ItemKind })}
        className="w-32"
      />
      <KeysHelp />
    </search>
  );
}
