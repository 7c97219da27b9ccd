import type { Check } from '../report';
import { roundUp, say, sayPlace } from './basis';
import type { CheckInput } from './check-input';

/** Can this printer print these vents, and does every pocket have one? The hole model decides. */
export function checkVents({ recipe, report }: CheckInput): Check {
  const model = recipe.print.holeModel;
  const nominal = roundUp((model.minOpenMm - model.offsetMm) / model.slope, 0.05);
  const blocked = report.vents.filter((vent) => !vent.printable);
  const traps = report.airTraps.filter((trap) => trap.trapsAir);
  const least = report.vents.length > 0 ? Math.min(...report.vents.map((vent) => vent.printedMm)) : null;
  const status = traps.length > 0 ? 'fail' : blocked.length > 0 ? 'caution' : 'pass';
  const noun = (n: number, one: string, many: string) => (n === 1 ? `one ${one}` : `${n} ${many}`);
  const findings = [
    traps.length > 0 ? `${noun(traps.length, 'pocket has', 'pockets have')} no vent that this printer leaves open, so the sheet traps air there` : '', // prettier-ignore
    blocked.length > 0 ? `${noun(blocked.length, 'vent prints', 'vents print')} shut or too narrow (${say(blocked[0].diameterMm, 2)} mm drawn leaves ${say(blocked[0].printedMm, 2)} mm)` : '', // prettier-ignore
  ].filter(Boolean);
  const remedies = [
    blocked.length > 0 ? `draw these vents with ${say(nominal, 2)} mm` : '',
    traps.length > 0 ? `add a vent of ${say(nominal, 2)} mm through to the bed at ${traps.slice(0, 4).map((trap) => sayPlace(trap.floor)).join('; at ')}` : '', // prettier-ignore
  ].filter(Boolean);
  return {
    id: 'vents',
    status,
    measured: least,
    limit: model.minOpenMm,
    unit: 'mm',
    basis: {
      source: `hole model of the recipe: printed = ${say(model.slope, 3)} × drawn ${model.offsetMm < 0 ? '−' : '+'} ${say(Math.abs(model.offsetMm), 2)} mm; to be proven on a coupon with this nozzle and filament (common practice, no source)`,
      kind: 'common practice',
    },
    message:
      findings.length > 0
        ? `${findings.join('; ').replace(/^./, (first) => first.toUpperCase())}.`
        : report.vents.length > 0
          ? `${report.vents.length === 1 ? 'The vent prints' : `All ${report.vents.length} vents print`} open, ${report.vents.length === 1 ? '' : 'the narrowest '}at ${say(least ?? 0, 2)} mm; marks in the part are not computed by this engine version.`
          : 'There is no pocket that would need a vent.',
    remedy:
      remedies.length > 0 ? `${remedies.join(', and ').replace(/^./, (first) => first.toUpperCase())}.` : '',
    places: [
      ...traps.map((trap) => ({ at: trap.floor, areaMm2: trap.planAreaMm2 })),
      ...blocked.map((vent) => ({ at: vent.at, areaMm2: (Math.PI / 4) * vent.diameterMm ** 2 })),
    ].slice(0, 12),
  };
}
