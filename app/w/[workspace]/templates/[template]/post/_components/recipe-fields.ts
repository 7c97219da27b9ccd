import { FILAMENTS } from '@/lib/formability/materials/filaments';
import { SHEETS } from '@/lib/formability/materials/sheets';

type Base = { path: string; label: string; help: string };
export type RecipeField =
  | (Base & {
      kind: 'number';
      unit?: string;
      min: number;
      max: number;
      step: number;
      whole?: boolean;
      /** An empty field has a meaning of its own, which the help says. */
      mayBeEmpty?: boolean;
    })
  | (Base & { kind: 'choice'; options: { value: string; label: string; detail?: string }[] })
  | (Base & { kind: 'yes-no' });

export type RecipeSection = { key: string; title: string; lead: string; fields: RecipeField[] };

const materials = (table: Record<string, { name: string }>) =>
  Object.entries(table).map(([value, { name }]) => ({ value, label: name }));

const number = (
  path: string,
  label: string,
  unit: string | undefined,
  [min, max, step]: [number, number, number],
  help: string,
): RecipeField => ({ kind: 'number', path, label, unit, min, max, step, help });

/** The recipe as a form: one entry a field, in the words of the shop, with unit, range and plain help. */
export const recipeSections: RecipeSection[] = [
  {
    key: 'sheet',
    title: 'Sheet',
    lead: 'What is formed over the template.',
    fields: [
      {
        kind: 'choice',
        path: 'sheet.material',
        label: 'Material',
        options: materials(SHEETS),
        help: 'Generic polymer; forming window and density come from its table.',
      },
      number('sheet.gaugeMm', 'Gauge', 'mm', [0.05, 20, 0.1], 'Thickness of the sheet before it is formed.'),
      number(
        'sheet.minFormedMm',
        'Thinnest allowed',
        'mm',
        [0, 20, 0.05],
        'The formed part may be no thinner than this anywhere.',
      ),
      {
        ...number(
          'sheet.formingC',
          'Forming temperature',
          '°C',
          [20, 400, 1],
          'Of the sheet when it meets the template; empty takes the middle of the material’s window. An estimate until a test pull proves it.',
        ),
        mayBeEmpty: true,
      } as RecipeField,
    ],
  },
  {
    key: 'print',
    title: 'Template',
    lead: 'How the template is printed.',
    fields: [
      {
        kind: 'choice',
        path: 'print.material',
        label: 'Filament',
        options: materials(FILAMENTS),
        help: 'It must stay stiff at the temperature that the sheet brings.',
      },
      number(
        'print.nozzleMm',
        'Nozzle',
        'mm',
        [0.1, 3, 0.1],
        'Smaller for fine detail, larger for large plain templates.',
      ),
      number(
        'print.layerMm',
        'Layer height',
        'mm',
        [0.01, 2, 0.02],
        'Thinner layers are smoother and release more easily.',
      ),
      number('print.shellMm', 'Shell', 'mm', [0.1, 200, 0.5], 'Thickness of the printed walls.'),
      number('print.topMm', 'Top', 'mm', [0.1, 200, 0.5], 'Thickness of the printed roof over the infill.'),
      number('print.infillPercent', 'Infill', '%', [0, 100, 5], 'Share of the inside that is filled.'),
      {
        kind: 'choice',
        path: 'print.infillPattern',
        label: 'Infill pattern',
        options: [
          { value: 'lines', label: 'Lines' },
          { value: 'grid', label: 'Grid' },
          { value: 'triangles', label: 'Triangles' },
          { value: 'gyroid', label: 'Gyroid' },
        ],
        help: 'Decides how far the top spans between supports.',
      },
      {
        kind: 'choice',
        path: 'print.releaseAgent',
        label: 'Release agent',
        options: [
          { value: 'none', label: 'None' },
          { value: 'dry-ptfe', label: 'Dry PTFE, wiped touch-dry' },
        ],
        help: 'Not for parts that touch food unless its maker declares it.',
      },
      {
        kind: 'yes-no',
        path: 'print.sanded',
        label: 'Walls are sanded',
        help: 'Sanded walls release with less draft.',
      },
    ],
  },
  {
    key: 'machine',
    title: 'Machine',
    lead: 'The frame that it must fit.',
    fields: [
      number(
        'machine.formingAreaMm.0',
        'Forming area, x',
        'mm',
        [10, 5000, 10],
        'Inside of the clamp frame from left to right.',
      ),
      number(
        'machine.formingAreaMm.1',
        'Forming area, y',
        'mm',
        [10, 5000, 10],
        'Inside of the clamp frame from front to back.',
      ),
      number(
        'machine.maxHeightMm',
        'Greatest height',
        'mm',
        [1, 2000, 5],
        'Tallest template that the machine takes.',
      ),
      number(
        'machine.frameMarginMm',
        'Frame margin',
        'mm',
        [0, 500, 5],
        'Free sheet wanted between template and frame.',
      ),
      number(
        'machine.pressureBar',
        'Pressure',
        'bar',
        [0, 20, 0.5],
        'Gauge pressure on the sheet. Follow the machine’s own documents.',
      ),
    ],
  },
  {
    key: 'run',
    title: 'Run',
    lead: 'What the template must live through.',
    fields: [
      {
        ...number(
          'run.pulls',
          'Pulls planned',
          undefined,
          [1, 1_000_000, 10],
          'How many parts this template is to make.',
        ),
        whole: true,
      } as RecipeField,
      number('run.cycleS', 'Cycle', 's', [1, 86_400, 5], 'Time from one pull to the next.'),
      number('run.ambientC', 'Room', '°C', [-40, 100, 1], 'Temperature that the template starts at.'),
    ],
  },
];
