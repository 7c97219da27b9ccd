import type { Basis, Check, Vent } from '../report';
import { drawnFor, roundDown, say, sayPlace } from './basis';
import type { CheckInput } from './check-input';

const MOST_PLACES = 12;
const SAID_PLACES = 4;

const MARK_BASIS: Basis = {
  source:
    'holes no wider than the formed sheet is thick (common practice, no source); height of the mark from a clamped membrane (Adkins and Rivlin) or plate',
  kind: 'common practice',
};

interface Fault {
  measured: number;
  limit: number;
  unit: string;
  basis: Basis;
  message: string;
  remedy: string;
  places: Check['places'];
}

/** Can this printer print these vents, and will they mark the part? The hole model of the recipe decides. */
export function checkVents(input: CheckInput): Check {
  const { recipe, report } = input;
  const faults = [missing(input), shut(input), marking(input)].filter((fault) => fault !== null);
  const open = report.vents.filter((vent) => vent.printable);
  if (faults.length > 0) {
    const [first] = faults;
    return {
      id: 'vents',
      status: first.unit === 'pockets' ? 'fail' : 'caution',
      measured: first.measured,
      limit: first.limit,
      unit: first.unit,
      basis: first.basis,
      message: faults.map((fault) => fault.message).join(' '),
      remedy: faults.map((fault) => fault.remedy).join(' '),
      places: faults.flatMap((fault) => fault.places).slice(0, MOST_PLACES),
    };
  }
  const least = open.length > 0 ? Math.min(...open.map((vent) => vent.printedMm)) : null;
  const mark = report.ventMarks.reduce((most, { heightMm }) => Math.max(most, heightMm), 0);
  return {
    id: 'vents',
    status: 'pass',
    measured: least,
    limit: least === null ? null : recipe.print.holeModel.minOpenMm,
    unit: 'mm',
    basis: modelBasis(input),
    message:
      least === null
        ? 'It has no vents to print.'
        : `${open.length === 1 ? 'The vent prints open' : `All ${open.length} vents print open, the narrowest`} at ${say(least, 2)} mm${mark > 0 ? `, and ${open.length === 1 ? 'leaves a mark' : 'they leave marks'} of about ${say(mark, 2)} mm in the part` : ''}.`,
    remedy: '',
    places: [],
  };
}

/** Where air is not reckoned, a pocket without an open vent is told here. */
function missing({ recipe, report, geometryOnly }: CheckInput): Fault | null {
  const traps = report.airTraps.filter((trap) => trap.trapsAir);
  if (!geometryOnly || traps.length === 0) return null;
  const at = traps.slice(0, SAID_PLACES).map((trap) => sayPlace(trap.floor));
  return {
    measured: traps.length,
    limit: 0,
    unit: 'pockets',
    basis: { source: 'a pocket with no way out holds the sheet off', kind: 'computed' },
    message: `${traps.length === 1 ? 'One pocket has' : `${traps.length} pockets have`} no vent that this printer leaves open, so the sheet traps air there.`,
    remedy: `Add a vent of ${say(drawnFor(recipe), 2)} mm through to the bed at ${at.join('; at ')}.`,
    places: traps.map((trap) => ({ at: trap.floor, areaMm2: trap.planAreaMm2 })),
  };
}

function shut(input: CheckInput): Fault | null {
  const { recipe, report } = input;
  const blocked = report.vents.filter((vent) => !vent.printable);
  if (blocked.length === 0) return null;
  const [first] = blocked;
  return {
    measured: Math.min(...blocked.map((vent) => vent.printedMm)),
    limit: recipe.print.holeModel.minOpenMm,
    unit: 'mm',
    basis: modelBasis(input),
    message: `${blocked.length === 1 ? 'One vent prints' : `${blocked.length} vents print`} shut or too narrow: ${say(first.diameterMm, 2)} mm drawn leaves ${say(first.printedMm, 2)} mm.`,
    remedy: `Draw ${blocked.length === 1 ? 'it' : 'them'} with ${say(drawnFor(recipe), 2)} mm, or print a pilot and drill.`,
    places: blocked.map(placeOf),
  };
}

function marking({ recipe, report }: CheckInput): Fault | null {
  const wide = report.ventMarks.filter(({ vent, thicknessMm }) => report.vents[vent].printedMm > thicknessMm);
  if (wide.length === 0) return null;
  const worst = wide.reduce((most, mark) => (mark.heightMm > most.heightMm ? mark : most));
  const { printedMm } = report.vents[worst.vent];
  const { slope, offsetMm, minOpenMm } = recipe.print.holeModel;
  const drawn = roundDown((worst.thicknessMm - offsetMm) / slope, 0.05);
  const narrower = worst.thicknessMm >= minOpenMm;
  return {
    measured: printedMm,
    limit: worst.thicknessMm,
    unit: 'mm',
    basis: MARK_BASIS,
    message: `${wide.length === 1 ? 'A vent opens' : `${wide.length} vents open`} wider than the sheet is thick there (${say(printedMm, 2)} against ${say(worst.thicknessMm, 2)} mm): a mark of about ${say(worst.heightMm, 2)} mm.`,
    remedy: narrower
      ? `Draw ${wide.length === 1 ? 'it' : 'them'} with ${say(drawn, 2)} mm, or put ${wide.length === 1 ? 'it' : 'them'} where a mark may show.`
      : `This printer leaves nothing narrower than ${say(minOpenMm, 2)} mm open: put ${wide.length === 1 ? 'it' : 'them'} where a mark may show, or take a thicker sheet.`,
    places: wide.map(({ vent }) => placeOf(report.vents[vent])),
  };
}

function placeOf(vent: Vent): Check['places'][number] {
  return { at: vent.at, areaMm2: (Math.PI / 4) * vent.diameterMm ** 2 };
}

function modelBasis({ recipe }: CheckInput): Basis {
  const { slope, offsetMm } = recipe.print.holeModel;
  return {
    source: `hole model of the recipe: printed = ${say(slope, 3)} × drawn ${offsetMm < 0 ? '−' : '+'} ${say(Math.abs(offsetMm), 2)} mm; to be proven on a coupon with this nozzle and filament (common practice, no source)`,
    kind: 'common practice',
  };
}
