import { FILAMENTS } from '../materials/filaments';
import { SHEETS } from '../materials/sheets';
import { toolC } from '../physics/conduction';
import { LOSS_WM2K } from '../physics/cycle-heating';
import { followPulls, type FollowedPulls } from '../physics/follow-pulls';
import type { EffectiveRecipe } from '../recipe';
import type { HeatReport, TransientReport } from '../report-forming';
import { softeningLimitC, thermalBodies } from './estimate-heat';

/** Depths below the template's surface that the report tells, mm. */
const DEPTHS_MM = [0.1, 0.25, 0.5, 1, 2, 4, 8, 16, 32];

/**
 * The planned pulls followed one by one through sheet, printed wall and infill. Unlike the contact temperature of the
 * first touch it knows that later sheets meet a warm template; unlike the lump it knows depth.
 * @param depthMm of the template along the pull
 * @param known runs made before, by their input: advice tries many recipes that heat alike
 */
export function estimatePulls(
  recipe: EffectiveRecipe,
  heat: Omit<HeatReport, 'transient'>,
  depthMm: number,
  known: Map<string, FollowedPulls>,
): TransientReport {
  const { sheet, print, run } = recipe;
  const { tool, body } = thermalBodies(recipe);
  const demouldC = Math.min(sheet.formingC, SHEETS[sheet.material].demouldC.value);
  const job = {
    sheet: body,
    gaugeMm: sheet.gaugeMm,
    formingC: sheet.formingC,
    demouldC,
    tool,
    shellMm: print.shellMm,
    infillShare: print.infillPercent / 100,
    depthMm: Math.max(depthMm, print.shellMm),
    ambientC: run.ambientC,
    lossWm2K: LOSS_WM2K,
    cycleS: run.cycleS,
    pulls: run.pulls,
  };
  const key = JSON.stringify(job);
  const followed = known.get(key) ?? followPulls(job);
  known.set(key, followed);
  const { surfaceC, profile, setFirstS, setLastS, setPulls, settled } = followed;
  const deepest = profile[profile.length - 1].depthMm;
  const laid = { sheet: body, tool, thicknessMm: sheet.gaugeMm, sheetC: sheet.formingC, toolC: run.ambientC };
  return {
    surfaceC,
    peakC: surfaceC.reduce((most, one) => Math.max(most, one), heat.contactC),
    settled,
    setFirstS,
    setLastS,
    setPulls,
    surfaceAtDemouldC: setFirstS === null ? null : toolC(laid, setFirstS),
    profile: DEPTHS_MM.filter((depth) => depth <= deepest).map((depth) => between(profile, depth)),
    softensToMm: softensTo(profile, softeningLimitC(FILAMENTS[print.material])),
  };
}

type Profile = FollowedPulls['profile'];

function between(profile: Profile, depthMm: number): Profile[number] {
  const k = Math.max(
    1,
    profile.findIndex((one) => one.depthMm >= depthMm),
  );
  const [a, b] = [profile[k - 1], profile[k]];
  const share = (depthMm - a.depthMm) / (b.depthMm - a.depthMm);
  const mix = (from: number, to: number) => from + share * (to - from);
  return { depthMm, firstC: mix(a.firstC, b.firstC), lastC: mix(a.lastC, b.lastC) };
}

/** Depth down to which the last pull is above the limit, mm; 0 where the surface's first cell already holds. */
function softensTo(profile: Profile, limitC: number): number {
  const cool = profile.findIndex((one) => one.lastC <= limitC);
  if (cool === 0) return 0;
  if (cool < 0) return profile[profile.length - 1].depthMm;
  const [a, b] = [profile[cool - 1], profile[cool]];
  return a.depthMm + ((b.depthMm - a.depthMm) * (a.lastC - limitC)) / (a.lastC - b.lastC);
}
