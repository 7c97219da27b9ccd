'use client';

import type { ReactNode } from 'react';
import type { FieldValues, UseFormSetValue } from 'react-hook-form';
import { Select } from '@/app/_components/select';

type Named = { id: string; name: string };
export type Library = {
  machines: (Named & {
    formingXMm: number;
    formingYMm: number;
    maxHeightMm: number;
    frameMarginMm: number;
    pressureBar: number;
  })[];
  printers: (Named & { nozzleMm: number; layerMm: number })[];
  sheets: (Named & { material: string; gaugeMm: number; minFormedMm: number })[];
  filaments: (Named & { material: string; shellMm: number; topMm: number; infillPercent: number })[];
};

type Set = UseFormSetValue<FieldValues>;
type Values = Record<string, unknown>;

/** Pickers that fill a section of the recipe from what the studio keeps. */
export function libraryPresets({
  library,
  setValue,
}: {
  library: Library;
  setValue: Set;
}): Partial<Record<string, ReactNode>> {
  const take = (values: Values) => {
    for (const [path, value] of Object.entries(values))
      setValue(path, value, { shouldDirty: true, shouldValidate: true });
  };
  return {
    sheet: (
      <Picker
        label="From the studio’s sheets"
        items={library.sheets}
        take={(s) =>
          take({
            'sheet.material': s.material,
            'sheet.gaugeMm': s.gaugeMm,
            'sheet.minFormedMm': s.minFormedMm,
            'sheet.formingC': null,
          })
        }
      />
    ),
    print: (
      <div className="flex flex-wrap gap-3">
        <Picker
          label="From the studio’s filaments"
          items={library.filaments}
          take={(f) =>
            take({
              'print.material': f.material,
              'print.shellMm': f.shellMm,
              'print.topMm': f.topMm,
              'print.infillPercent': f.infillPercent,
            })
          }
        />
        <Picker
          label="From the studio’s printers"
          items={library.printers}
          take={(p) =>
            take({ 'print.nozzleMm': p.nozzleMm, 'print.layerMm': p.layerMm, 'print.lineMm': null })
          }
        />
      </div>
    ),
    machine: (
      <Picker
        label="From the studio’s machines"
        items={library.machines}
        take={(m) =>
          take({
            'machine.formingAreaMm.0': m.formingXMm,
            'machine.formingAreaMm.1': m.formingYMm,
            'machine.maxHeightMm': m.maxHeightMm,
            'machine.frameMarginMm': m.frameMarginMm,
            'machine.pressureBar': m.pressureBar,
          })
        }
      />
    ),
  };
}

function Picker<Item extends Named>({
  label,
  items,
  take,
}: {
  label: string;
  items: Item[];
  take: (item: Item) => void;
}) {
  if (items.length === 0) return null;
  return (
    <Select
      label={label}
      className="min-w-56"
      placeholder="Take over …"
      options={items.map(({ id, name }) => ({ value: id, label: name }))}
      onChange={(id) => {
        const item = items.find((candidate) => candidate.id === id);
        if (item) take(item);
      }}
    />
  );
}
