import { describe, expect, it } from 'vitest';
import { analyse } from '@/lib/formability/analyse';
import type { RecipeInput } from '@/lib/formability/recipe';
import { CHECK_IDS, type CheckId, type CheckStatus } from '@/lib/formability/report';
import { carved, rectangle, turnedRing } from '../../../fixtures/meshes/carved';
import { box, dome, extrude, frustum, lathe } from '../../../fixtures/meshes/solids';
import { flipped, moved, together, type Triangles } from '../../../fixtures/meshes/triangles';
import { binaryStl } from '../../../fixtures/meshes/write-stl';
import { checkOf } from '../run-engine';

/** Every check in every state that it has: the status, the pair that is compared, and sentences with figures in them. */

/** How measured and limit stand to one another; '' where one of them is left out, or a margin lies between. */
type Order = '<=' | '<' | '>' | '>=' | '';
type Options = 'whole' | 'geometry' | 'sheet';
type Row = [CheckId, CheckStatus, Order, () => Triangles, RecipeInput?, Options?];

const sound = () => frustum(100, 80, 30, 8);
const large = () => frustum(200, 150, 30, 8);
const t = () => extrude([[-10, 0], [10, 0], [10, 20], [30, 20], [30, 30], [-30, 30], [-30, 20], [-10, 20]], 60); // prettier-ignore
const towers = (gap: number) => () => together(box(30, 40, 45), moved(box(30, 40, 30), 30 + gap, 0, 0));
const pit = (diameter: number) => () =>
  carved(rectangle(80, 60), 30, [{ ring: rectangle(40, 30), z: 10, pockets: diameter > 0 ? [{ ring: turnedRing(diameter / 2, 16), z: 0 }] : [] }]); // prettier-ignore
const mushroom = () => lathe([[0, 0], [20, 0], [20, 10], [40, 20], [40, 30], [0, 30]], 48); // prettier-ignore

const exactHoles = { print: { holeModel: { slope: 1, offsetMm: 0, minOpenMm: 0.4 } } };
const thick = { sheet: { gaugeMm: 2, minFormedMm: 0.35 }, machine: { frameMarginMm: 20 } };
const pc = (pulls: number, cycleS: number) => ({
  print: { material: 'pc' as const },
  run: { pulls, cycleS },
});
const soft = (topMm: number) => ({ print: { material: 'petg' as const, topMm, infillPercent: 15 }, run: { pulls: 1 }, sheet: { formingC: 125 } }); // prettier-ignore
const formed = (minFormedMm: number) => ({ sheet: { gaugeMm: 0.8, minFormedMm }, grid: { cellMm: 1, sheetNodes: 32 } }); // prettier-ignore

const ROWS: Row[] = [
  ['mesh', 'pass', '<=', sound],
  ['mesh', 'caution', '>', () => flipped(sound())],
  ['mesh', 'fail', '>', () => sound().slice(9)],
  ['fit', 'pass', '<=', sound],
  ['fit', 'caution', '<=', () => box(240, 390, 20), { grid: { cellMm: 4 } }],
  ['fit', 'fail', '>', () => box(100, 100, 121)],
  ['draft', 'pass', '>=', sound, { print: { sanded: true } }],
  ['draft', 'caution', '<', () => frustum(100, 80, 30, 4), { print: { sanded: true } }],
  ['draft', 'fail', '<', () => frustum(100, 80, 30, 2), { print: { sanded: true } }],
  ['undercut', 'pass', '<=', sound],
  ['undercut', 'fail', '>', t],
  ['layers', 'pass', '<=', sound],
  ['layers', 'caution', '>', sound, { print: { layerMm: 0.3 } }],
  ['edges', 'pass', '>=', () => dome(30, 32, 16)],
  ['edges', 'caution', '<', sound],
  ['spacing', 'pass', '<=', towers(31)],
  ['spacing', 'caution', '>', towers(20)],
  ['spacing', 'fail', '>', towers(12)],
  ['draw', 'pass', '<=', sound],
  ['draw', 'caution', '>', () => box(40, 40, 110), thick],
  ['draw', 'fail', '<', sound, { sheet: { gaugeMm: 0.5, minFormedMm: 0.45 } }],
  ['sheet', 'pass', '>=', () => frustum(80, 60, 25, 10), formed(0.1), 'sheet'],
  ['sheet', 'fail', '<', () => frustum(80, 60, 25, 10), formed(0.7), 'sheet'],
  ['sheet', 'not-run', '', sound],
  ['air', 'pass', '<=', sound],
  ['air', 'caution', '>', pit(0.4), exactHoles],
  ['air', 'fail', '', pit(0)],
  ['air', 'not-run', '', pit(0), {}, 'geometry'],
  ['vents', 'pass', '>=', pit(0.7), { sheet: { gaugeMm: 2 } }],
  ['vents', 'caution', '<', pit(0.5)],
  ['vents', 'caution', '>', pit(1.2), exactHoles],
  ['vents', 'fail', '>', pit(0), {}, 'geometry'],
  ['shell', 'pass', '>=', large, { print: { shellMm: 4, topMm: 4 } }],
  ['shell', 'caution', '<', large, { print: { shellMm: 2, topMm: 2 } }],
  ['shell', 'caution', '>', large, { print: { shellMm: 6, topMm: 6 } }],
  ['skin', 'pass', '<=', sound],
  ['skin', 'caution', '>', sound, { print: { topMm: 0.8, infillPercent: 10 }, run: { pulls: 1 } }],
  ['skin', 'fail', '>', sound, soft(0.6)],
  ['skin', 'not-run', '', sound, {}, 'geometry'],
  ['walls', 'pass', '<=', sound],
  ['walls', 'caution', '>', sound, { print: { shellMm: 8, topMm: 8, infillPercent: 0 } }],
  ['walls', 'fail', '<', sound, { print: { shellMm: 4, topMm: 4, infillPercent: 0 } }],
  ['walls', 'not-run', '', sound, {}, 'geometry'],
  ['heat', 'pass', '<=', sound, pc(2, 300)],
  ['heat', 'caution', '<=', sound, pc(5, 60)],
  ['heat', 'fail', '>', sound, pc(60, 40)],
  ['heat', 'fail', '>', sound, { print: { material: 'pla' } }],
  ['heat', 'not-run', '', sound, {}, 'geometry'],
  ['nozzle', 'pass', '<=', sound],
  ['nozzle', 'caution', '>', () => together(sound(), moved(box(0.7, 20, 10), 70, 0, 0))],
  ['nozzle', 'caution', '<', large, { print: { nozzleMm: 0.2, layerMm: 0.1 } }],
  ['overhang', 'pass', '<=', sound],
  ['overhang', 'caution', '>', mushroom],
  ['release', 'pass', '>=', sound],
  ['release', 'caution', '<', () => frustum(100, 80, 30, 4), { print: { releaseAgent: 'none' } }],
  ['print', 'pass', '', sound],
];

/** Remedies that name a thing to do that has no figure. */
const NO_FIGURE: CheckId[] = ['mesh', 'release', 'heat'];

const check = (id: CheckId, mesh: () => Triangles, recipe: RecipeInput = {}, options: Options = 'whole') => {
  const lent = { geometryOnly: options === 'geometry', sheet: options === 'sheet' };
  return checkOf(analyse(binaryStl(mesh()), { grid: { cellMm: 2 }, ...recipe }, lent).report, id);
};

const stands = (measured: number, order: Order, limit: number) =>
  ({ '<': measured < limit, '<=': measured <= limit + 1e-3, '>': measured > limit, '>=': measured >= limit - 1e-3, '': true })[order]; // prettier-ignore

describe('every check in each of its states', () => {
  it.each(ROWS.map((row, n) => [row[0], row[1], row[2], n] as const))(
    '%s: %s (measured %s limit)',
    (id, status, order, n) => {
      // prettier-ignore
      const [, , , mesh, recipe, options] = ROWS[n];
      const found = check(id, mesh, recipe, options);
      const words = `${found.message} ${found.remedy}`;
      expect([found.status, words]).toEqual([status, words]);
      expect(words).not.toMatch(/NaN|undefined|null|Infinity|\[object/);
      for (const value of [found.measured, found.limit])
        expect(value === null || Number.isFinite(value)).toBe(true);
      if (order !== '') {
        const [measured, limit] = [found.measured ?? NaN, found.limit ?? NaN];
        expect(stands(measured, order, limit), `${measured} ${order} ${limit}`).toBe(true);
      }
      expect(found.basis.source.length).toBeGreaterThan(10);
      const calls = status === 'caution' || status === 'fail';
      expect(found.remedy !== '').toBe(calls || (id === 'release' && found.remedy !== ''));
      if (calls) expect(words).toMatch(/\d/);
      if (calls && !NO_FIGURE.includes(id)) expect(found.remedy).toMatch(/\d/);
      if (status === 'not-run') expect([found.measured, found.limit]).toEqual([null, null]);
    },
  );

  it('no check is missing here', () => {
    expect([...new Set(ROWS.map(([id]) => id))]).toEqual([...CHECK_IDS]);
    expect(ROWS.filter(([, status]) => status === 'pass').map(([id]) => id)).toEqual([...CHECK_IDS]);
  });
});
