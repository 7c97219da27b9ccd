import type { Check, CheckId } from '../report';

/** Checks that a caller may leave out, and what each finds. */
const LEFT_OUT: Partial<Record<CheckId, { unit: string; finds: string }>> = {
  sheet: { unit: 'mm', finds: 'the thickness of the formed sheet' },
  air: { unit: 's', finds: 'the time in which the air leaves each pocket' },
  skin: { unit: 'mm', finds: 'the sag of the top between infill lines' },
  walls: { unit: 'mm', finds: 'the give of hollow walls under pressure' },
  heat: { unit: '°C', finds: 'the temperature of the template over the pulls' },
};

/** A check that is honest about not having been made; undefined for those that always are. */
export function notRun(id: CheckId, geometryOnly: boolean): Check | undefined {
  const left = LEFT_OUT[id];
  if (!left) return undefined;
  return {
    id,
    status: 'not-run',
    measured: null,
    limit: null,
    unit: left.unit,
    basis: { source: 'none: nothing was judged', kind: 'computed' },
    message: geometryOnly
      ? `Left out: only geometry was asked for, not ${left.finds}.`
      : `Left out: ${left.finds} was not asked for. Prove it with a test pull.`,
    remedy: '',
    places: [],
  };
}
