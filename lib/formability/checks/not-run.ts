import type { Check, CheckId } from '../report';

/** Checks whose physics this version does not compute, and what each would need. */
const MISSING: Partial<Record<CheckId, { unit: string; needs: string }>> = {
  sheet: { unit: 'mm', needs: 'the thickness of the formed sheet' },
  air: { unit: 's', needs: 'the time in which the air leaves each pocket' },
  skin: { unit: 'mm', needs: 'the sag of the top between infill lines' },
  walls: { unit: 'mm', needs: 'the give of hollow walls under pressure' },
  heat: { unit: '°C', needs: 'the temperature of the template over the pulls' },
};

/** A check that is honest about not having been made; undefined for those that are. */
export function notRun(id: CheckId, geometryOnly: boolean): Check | undefined {
  const missing = MISSING[id];
  if (!missing) return undefined;
  return {
    id,
    status: 'not-run',
    measured: null,
    limit: null,
    unit: missing.unit,
    basis: { source: 'none: nothing was judged', kind: 'computed' },
    message: geometryOnly
      ? `Left out: only geometry was asked for, not ${missing.needs}.`
      : `Not computed by this engine version: it does not yet find ${missing.needs}. Prove it with a test pull.`,
    remedy: '',
    places: [],
  };
}
