import { FILAMENTS } from './materials/filaments';
import { SHEETS } from './materials/sheets';
import type { MaterialValue } from './materials/value';
import { defaultRecipe, type EffectiveRecipe } from './recipe';
import type { Basis, CheckId } from './report';
import type { Sureness, SureSection } from './report-forming';

/** Figures that are measured on the mesh: what is uncertain there is the limit alone. */
const MEASURED: ReadonlySet<CheckId> = new Set([
  'mesh',
  'fit',
  'draft',
  'undercut',
  'edges',
  'spacing',
  'draw',
  'shell',
  'nozzle',
  'overhang',
]);

const source = (note: string): Sureness => ({ kind: 'source', note });
const estimate = (note: string): Sureness => ({ kind: 'estimate', note });
const calibrated = (note: string): Sureness => ({ kind: 'calibrated', note });

/**
 * How sure each section's figures are: from a named source, calibrated by the studio (its own hole model, costs, limits or
 * pull log), or an estimate, with what would make it surer.
 */
export function judgeSureness(
  recipe: EffectiveRecipe,
  given: { sheetRun: boolean; pullLog: boolean },
): Record<SureSection, Sureness> {
  const materials = `material figures of ${FILAMENTS[recipe.print.material].name} and ${SHEETS[recipe.sheet.material].name} ${materialMarks(recipe)}`;
  const holes = ownHoles(recipe)
    ? calibrated('open diameters by the hole model of the recipe, the studio’s own')
    : null;
  const thickness = given.sheetRun
    ? 'formed thickness from the run of the sheet'
    : 'formed thickness as the mean of the areal draw ratio: run the sheet for that of the place';
  return {
    draft: source('measured on the mesh'),
    plan: source('measured on the mesh'),
    web: estimate('hoop against meridian stretch of one ring, derived; no experiment'),
    thinning: estimate('no-slip rules for a free sheet, derived; 20 to 60 % off in deep or round places'),
    sheet: given.sheetRun
      ? estimate(
          'membrane computed, held against closed forms; the sheet’s law and friction assumed, no experiment',
        )
      : estimate('not run, so nothing is said'),
    layers: estimate(`cusp by a published rule; what shows through derived, ${thickness}`),
    air:
      holes ??
      estimate('gas dynamics by a standard; hole model, discharge and pressure assumed: print a coupon'),
    ventMarks: estimate(`membrane or plate at an assumed hot modulus of 3 MPa, ${thickness}`),
    heat: estimate(`conduction by textbook; ${materials}; losses and perfect contact assumed`),
    skin: estimate(`plates by textbook; ${materials}; creep factor and sag that shows by practice`),
    wallsUnderPressure: estimate(`plates and buckling by textbook; ${materials}; knock-down by practice`),
    life: given.pullLog
      ? calibrated('the studio’s own pull log')
      : estimate('margins of the estimates above; no formula tells wear: keep a pull log'),
    print: ownCosts(recipe)
      ? calibrated('rates of the studio; speed and efficiency assumed')
      : estimate('speed, efficiency and rates assumed'),
  };
}

/** How sure a check is: its limit where the mesh is measured, its weakest figure elsewhere. */
export function sureOfCheck(
  id: CheckId,
  basis: Basis,
  sections: Record<SureSection, Sureness>,
  holesOwn: boolean,
): Sureness {
  if (MEASURED.has(id)) return sureOfLimit(basis);
  switch (id) {
    case 'walls':
      return sections.wallsUnderPressure;
    case 'vents':
      return holesOwn ? calibrated('open diameters by the studio’s own hole model') : sections.ventMarks;
    case 'layers':
    case 'sheet':
    case 'air':
    case 'skin':
    case 'heat':
    case 'print':
      return basis.movedByRecipe ? sureOfLimit(basis) : sections[id];
    default:
      return sureOfLimit(basis);
  }
}

function sureOfLimit(basis: Basis): Sureness {
  if (basis.movedByRecipe) return calibrated('measured on the mesh, held to the studio’s own limit');
  if (basis.kind === 'common practice' || /no source|assumed/.test(basis.source))
    return estimate('measured on the mesh, held to a limit of common practice');
  return source('measured on the mesh, held to a limit with a named source');
}

/** Whether the studio gave its own line from a coupon. */
export function ownHoles({ print: { holeModel } }: EffectiveRecipe): boolean {
  const usual = defaultRecipe().print.holeModel;
  return (
    holeModel.slope !== usual.slope ||
    holeModel.offsetMm !== usual.offsetMm ||
    holeModel.minOpenMm !== usual.minOpenMm
  );
}

function ownCosts({ costs }: EffectiveRecipe): boolean {
  const usual = defaultRecipe().costs;
  return (
    costs.materialPerKg !== usual.materialPerKg ||
    costs.machinePerHour !== usual.machinePerHour ||
    costs.labour !== usual.labour
  );
}

function materialMarks({ print, sheet }: EffectiveRecipe): string {
  const values = [FILAMENTS[print.material], SHEETS[sheet.material]]
    .flatMap((material): unknown[] => Object.values(material))
    .filter((value): value is MaterialValue => typeof value === 'object' && value !== null);
  const known = values.filter((value) => value.mark !== 'memory').length;
  return `usual datasheet ranges, ${known} of ${values.length} confirmed by a source and the rest from memory`;
}
