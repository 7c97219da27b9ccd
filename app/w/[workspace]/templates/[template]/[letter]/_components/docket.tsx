'use client';

import type { Ref } from 'react';
import { Button } from '@/app/_components/button';
import { Disclosure } from '@/app/_components/disclosure';
import { SectionHead } from '@/app/_components/section-head';
import { AddNote } from './add-note';
import { DocketEntry } from './docket-entry';
import { DocketFilterBar } from './docket-filter-bar';
import {
  byGroup,
  filterItems,
  groupOrder,
  type DocketFilter,
  type DocketGroup,
  type DocketItem,
} from './docket-items';
import { docketSentence } from './docket-sentence';
import { useRoom } from './room-context';

const heads: Record<DocketGroup, { title: string; tone: 'madder' | 'ochre' | 'ink' }> = {
  settle: { title: 'To settle', tone: 'madder' },
  look: { title: 'To look at', tone: 'ochre' },
  after: { title: 'After approval', tone: 'ink' },
  settled: { title: 'Settled', tone: 'ink' },
  fine: { title: 'Checked and fine', tone: 'ink' },
  unchecked: { title: 'Not checked', tone: 'ink' },
};
/** These are read now and then, and would push the open ones off the page. */
const folded: readonly DocketGroup[] = ['settled', 'fine', 'unchecked'];

export interface DocketProps {
  items: readonly DocketItem[];
  filter: DocketFilter;
  onFilter: (change: Partial<DocketFilter>) => void;
  filterRef: Ref<HTMLInputElement>;
  adding: boolean;
  onAdding: (adding: boolean) => void;
}

/** The one list of findings and notes. */
export function Docket({ items, filter, onFilter, filterRef, adding, onAdding }: DocketProps) {
  const { revision, reader, hasDraft } = useRoom();
  const all = byGroup(items);
  const shown = byGroup(filterItems(items, filter, reader.id));
  const isFiltered = filter.kind !== 'all' || filter.search !== '';
  const nothing = isFiltered && groupOrder.every((group) => shown[group].length === 0);
  return (
    <section aria-labelledby="docket-title" className="flex flex-col gap-3">
      <div className="grid grid-cols-[1fr_auto] items-center gap-x-4">
        <h2 id="docket-title" tabIndex={-1} className="text-lg font-semibold">
          Docket
        </h2>
        {revision.can.note && !adding ? (
          <Button size="small" onPress={() => onAdding(true)} className="print:hidden">
            {hasDraft('new') ? 'Go on with your note' : 'Add a note'}
          </Button>
        ) : null}
        <p className="col-span-2 text-base text-slate" role="status">
          {docketSentence(all, revision)}
        </p>
      </div>
      <DocketFilterBar filter={filter} onFilter={onFilter} inputRef={filterRef} />
      <AddNote isOpen={adding} onOpen={onAdding} />
      {items.length === 0 ? (
        <p className="border-t border-ink pt-3 text-base text-slate">
          Nothing stands here yet. The findings come with the check; a note can be written at any time.
        </p>
      ) : null}
      {nothing ? (
        <p className="border-t border-ink pt-3 text-base text-slate">
          Nothing in the docket fits the filter.{' '}
          <Button variant="plain" size="small" onPress={() => onFilter({ search: '', kind: 'all' })}>
            Show everything
          </Button>
        </p>
      ) : null}
      {groupOrder.map((group) =>
        shown[group].length > 0 ? (
          <GroupSection
            key={`${group}-${isFiltered}`}
            group={group}
            items={shown[group]}
            isOpen={isFiltered || !folded.includes(group)}
          />
        ) : null,
      )}
    </section>
  );
}

function GroupSection(props: { group: DocketGroup; items: readonly DocketItem[]; isOpen: boolean }) {
  const { group, items, isOpen } = props;
  const { active } = useRoom();
  const { title, tone } = heads[group];
  const holdsActive = items.some((item) => item.key === active);
  if (!folded.includes(group)) {
    return (
      <section aria-labelledby={`group-${group}`}>
        <SectionHead id={`group-${group}`} title={title} tone={tone} count={items.length} level={3} />
        <ul>
          {items.map((item) => (
            <DocketEntry key={item.key} item={item} level={4} />
          ))}
        </ul>
      </section>
    );
  }
  return (
    <FoldedGroup
      key={holdsActive ? 'open' : 'as-is'}
      title={title}
      items={items}
      isOpen={isOpen || holdsActive}
    />
  );
}

function FoldedGroup(props: { title: string; items: readonly DocketItem[]; isOpen: boolean }) {
  return (
    <div className="print:[&_[hidden]]:block print:[&_[hidden]]:[content-visibility:visible]">
      <Disclosure
        defaultExpanded={props.isOpen}
        title={
          <span className="flex grow justify-between gap-3 font-mono text-label font-medium uppercase">
            {props.title} <span>{props.items.length}</span>
          </span>
        }
      >
        <ul className="-ml-4">
          {props.items.map((item) => (
            <DocketEntry key={item.key} item={item} level={4} />
          ))}
        </ul>
      </Disclosure>
    </div>
  );
}
