import { DataTable, type Column } from '@/app/_components/data-table';
import { EmptyState } from '@/app/_components/empty-state';
import { Figure } from '@/app/_components/figure';
import { Length } from '@/app/_components/length';
import { SectionHead } from '@/app/_components/section-head';
import type { LibraryItem, LibraryKind } from '@/lib/studio/schemas';
import { ItemDialog } from './item-dialog';
import { RemoveItem } from './remove-item';
import { shelfFields, shelfWords, type ShelfField } from './shelf-fields';

type Props = { kind: LibraryKind; items: readonly LibraryItem[]; apiPath: string; mayChange: boolean };

/** One shelf of the library. */
export function Shelf({ kind, items, apiPath, mayChange }: Props) {
  const words = shelfWords[kind];
  const shelfPath = `${apiPath}/library/${kind}`;
  return (
    <section aria-labelledby={kind} className="mb-9">
      <SectionHead
        id={kind}
        title={words.title}
        actions={mayChange ? <ItemDialog apiPath={shelfPath} kind={kind} /> : null}
      />
      <p className="mb-2 text-sm text-slate">{words.lead}</p>
      <DataTable
        caption={words.title}
        columns={columnsOf(kind, shelfPath, mayChange)}
        rows={items}
        rowKey={(item) => item.id}
        empty={
          <EmptyState level={3} title={`No ${words.title.toLowerCase()} yet`}>
            {mayChange
              ? `Add the first ${words.one}: recipes take their values from here.`
              : 'A lead or a producer of the studio adds them.'}
          </EmptyState>
        }
      />
    </section>
  );
}

function columnsOf(kind: LibraryKind, shelfPath: string, mayChange: boolean): Column<LibraryItem>[] {
  const columns = shelfFields[kind].map((field): Column<LibraryItem> => ({
    key: field.name,
    label: field.short ?? field.label,
    isHead: field.name === 'name',
    align: field.unit ? 'end' : 'start',
    cell: (item) => <Value item={item} field={field} />,
  }));
  if (mayChange)
    columns.push({
      key: 'change',
      label: 'Change',
      align: 'end',
      cell: (item) => (
        <span className="flex justify-end gap-2">
          <ItemDialog apiPath={shelfPath} kind={kind} item={item} />
          <RemoveItem apiPath={shelfPath} item={{ id: item.id, name: item.name, version: item.version }} />
        </span>
      ),
    });
  return columns;
}

function Value({ item, field }: { item: LibraryItem; field: ShelfField }) {
  const value = (item as unknown as Record<string, string | number>)[field.name];
  if (field.options) return field.options.find((option) => option.value === value)?.label ?? value;
  if (field.unit === 'mm') return <Length mm={Number(value)} digits={field.digits} />;
  if (field.unit) return <Figure value={Number(value)} unit={field.unit} digits={field.digits} />;
  return (
    <>
      <span className="font-semibold">{value}</span>
      {item.isDefault ? <span className="text-sm text-slate"> · suggested first</span> : null}
    </>
  );
}
