import { FILAMENTS, FILAMENT_IDS } from '@/lib/formability/materials/filaments';
import { SHEETS, SHEET_IDS } from '@/lib/formability/materials/sheets';
import type { LibraryKind } from '@/lib/studio/schemas';

export type ShelfField = {
  name: string;
  label: string;
  /** Heading of its column, where the label is too long. */
  short?: string;
  help?: string;
  unit?: string;
  step?: number;
  /** Decimals of the figure in the table. */
  digits?: number;
  options?: { value: string; label: string; detail?: string }[];
};

const name: ShelfField = { name: 'name', label: 'Name', help: 'As it is called in the shop.' };
const materials = (ids: readonly string[], table: Record<string, { name: string; note: string }>) =>
  ids.map((id) => ({ value: id, label: table[id].name, detail: table[id].note || undefined }));

/** What each shelf's form asks, in the words of the shop. Lengths mm, pressure bar (gauge). */
export const shelfFields: Record<LibraryKind, ShelfField[]> = {
  machines: [
    name,
    {
      name: 'formingXMm',
      label: 'Forming area, width',
      short: 'Width',
      unit: 'mm',
      digits: 0,
      help: 'Sheet that can move, inside the clamp frame.',
    },
    { name: 'formingYMm', label: 'Forming area, depth', short: 'Depth', unit: 'mm', digits: 0 },
    {
      name: 'maxHeightMm',
      label: 'Greatest template height',
      short: 'Height',
      unit: 'mm',
      digits: 0,
      help: 'Daylight above the bed, less what the sheet needs.',
    },
    {
      name: 'frameMarginMm',
      label: 'Margin to the frame',
      short: 'Margin',
      unit: 'mm',
      digits: 0,
      help: 'Free sheet that is kept between template and frame on every side.',
    },
    {
      name: 'pressureBar',
      label: 'Forming pressure',
      short: 'Pressure',
      unit: 'bar',
      digits: 1,
      step: 0.1,
      help: 'What the machine’s own papers allow is the most. The vessel is rated, not guessed.',
    },
  ],
  printers: [
    name,
    { name: 'buildXMm', label: 'Build width', short: 'Width', unit: 'mm', digits: 0 },
    { name: 'buildYMm', label: 'Build depth', short: 'Depth', unit: 'mm', digits: 0 },
    { name: 'buildZMm', label: 'Build height', short: 'Height', unit: 'mm', digits: 0 },
    { name: 'nozzleMm', label: 'Nozzle', unit: 'mm', step: 0.1, help: 'The one that is usually fitted.' },
    {
      name: 'layerMm',
      label: 'Layer',
      unit: 'mm',
      step: 0.05,
      help: '0.1 to 0.2 mm; thinner is smoother and releases more easily (common practice).',
    },
  ],
  sheets: [
    name,
    { name: 'material', label: 'Material', options: materials(SHEET_IDS, SHEETS) },
    { name: 'gaugeMm', label: 'Gauge', unit: 'mm', step: 0.1, help: 'Thickness before forming.' },
    {
      name: 'minFormedMm',
      label: 'Least formed thickness',
      short: 'Least formed',
      unit: 'mm',
      step: 0.05,
      help: 'Thinner anywhere on the part is not accepted.',
    },
  ],
  filaments: [
    name,
    { name: 'material', label: 'Material', options: materials(FILAMENT_IDS, FILAMENTS) },
    { name: 'shellMm', label: 'Shell', unit: 'mm', digits: 1, step: 0.1, help: 'Printed walls.' },
    { name: 'topMm', label: 'Top', unit: 'mm', digits: 1, step: 0.1, help: 'Printed roof over the infill.' },
    { name: 'infillPercent', label: 'Infill', unit: '%', digits: 0, step: 5 },
  ],
};

export const shelfWords: Record<LibraryKind, { title: string; one: string; lead: string }> = {
  machines: { title: 'Machines', one: 'machine', lead: 'The frame that a template must fit.' },
  printers: { title: 'Printers', one: 'printer', lead: 'Where templates are printed.' },
  sheets: { title: 'Sheets', one: 'sheet', lead: 'Stock that is formed, in the gauges kept here.' },
  filaments: {
    title: 'Template materials',
    one: 'material',
    lead: 'What templates are printed from, and how.',
  },
};
