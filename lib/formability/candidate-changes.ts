import { roundUp, say } from './checks/basis';
import { FILAMENTS } from './materials/filaments';
import { filamentsThatHold } from './measures/estimate-heat';
import type { EffectiveRecipe, RecipeInput } from './recipe';
import type { CheckId, CheckStatus, Report } from './report';

export interface Candidate {
  change: RecipeInput;
  text: string;
}

type Known = Pick<Report, 'heat' | 'skin' | 'layers' | 'plan' | 'wallsUnderPressure'>;

/** Nozzles that are sold, mm (common practice, no source). */
const NOZZLES = [0.25, 0.4, 0.6, 0.8];

/** Changes of the recipe worth trying for what does not pass; whether they mend it, the checks themselves say. */
export function candidateChanges(
  recipe: EffectiveRecipe,
  report: Known,
  status: ReadonlyMap<CheckId, CheckStatus>,
  /** Gauge that a run of the sheet found to do. */
  provenGaugeMm?: number | null,
): Candidate[] {
  const bad = (id: CheckId) => status.get(id) === 'fail' || status.get(id) === 'caution';
  return [
    ...(bad('heat') ? forHeat(recipe, report) : []),
    ...(bad('skin') || bad('shell') || bad('walls') ? forStiffness(recipe, report) : []),
    ...(bad('draft') || bad('layers') ? forLayers(recipe, report) : []),
    ...(bad('draw') || bad('vents') || bad('sheet') ? forGauge(recipe, report, provenGaugeMm ?? null) : []),
    ...(bad('nozzle') ? forNozzle(recipe) : []),
    ...(bad('release') && recipe.print.releaseAgent === 'none'
      ? [
          {
            change: { print: { releaseAgent: 'dry-ptfe' as const } },
            text: 'Spray a dry PTFE film and wipe it touch-dry.',
          },
        ]
      : []),
  ];
}

function forHeat(recipe: EffectiveRecipe, { heat }: Known): Candidate[] {
  const found: Candidate[] = [];
  if (!heat) return found;
  if (heat.cycleThatHoldsS !== null && heat.cycleThatHoldsS > recipe.run.cycleS)
    found.push({
      change: { run: { cycleS: heat.cycleThatHoldsS } },
      text: `Take ${heat.cycleThatHoldsS} s a pull instead of ${say(recipe.run.cycleS, 2)} s.`,
    });
  const pulls = Math.floor(heat.pullsBeforeRest);
  if (pulls > 0 && pulls < recipe.run.pulls)
    found.push({
      change: { run: { pulls } },
      text: `Let it cool after every ${pulls} ${pulls === 1 ? 'pull' : 'pulls'}.`,
    });
  for (const { id } of filamentsThatHold(recipe, 0))
    found.push({ change: { print: { material: id } }, text: `Print it in ${FILAMENTS[id].name}.` });
  return found;
}

function forStiffness(recipe: EffectiveRecipe, { skin, wallsUnderPressure }: Known): Candidate[] {
  const { print, limits } = recipe;
  const found: Candidate[] = [];
  const top = Math.max(skin?.topThatHoldsMm ?? 0, limits.shellMinMm);
  const topMm = roundUp(top, 0.1);
  if (topMm > print.topMm && topMm <= 4 * print.topMm)
    found.push({
      change: { print: { topMm } },
      text: `Print a top of ${say(topMm, 2)} mm instead of ${say(print.topMm, 2)} mm.`,
    });
  const forWalls = wallsUnderPressure?.infill ? wallsUnderPressure.infillThatHoldsPercent : 0;
  const infill = Math.ceil(Math.max(skin?.infillThatHoldsPercent ?? 0, forWalls ?? 0));
  if (infill > print.infillPercent && infill <= 100)
    found.push({
      change: { print: { infillPercent: infill } },
      text: `Fill it to ${infill} % instead of ${say(print.infillPercent, 2)} %.`,
    });
  if (print.infillPercent < 25)
    found.push({
      change: { print: { infillPercent: 35 } },
      text: `Fill it to 35 % instead of ${say(print.infillPercent, 2)} %.`,
    });
  for (const shellMm of [limits.shellMinMm, (limits.shellMinMm + limits.shellMaxMm) / 2, limits.shellMaxMm]) {
    if (shellMm === print.shellMm) continue;
    const evenTop = Math.max(print.topMm, shellMm);
    found.push({
      change: { print: { shellMm, ...(evenTop > print.topMm ? { topMm: evenTop } : {}) } },
      text: `Print walls of ${say(shellMm, 2)} mm${evenTop > print.topMm ? ' and a top as thick' : ''}.`,
    });
  }
  if (wallsUnderPressure?.empty && print.infillPercent === 0 && infill === 0)
    found.push({ change: { print: { infillPercent: 25 } }, text: 'Fill it to 25 %.' });
  return found;
}

function forLayers(recipe: EffectiveRecipe, { layers }: Known): Candidate[] {
  const { print, limits } = recipe;
  const found: Candidate[] = [];
  if (!print.sanded) found.push({ change: { print: { sanded: true } }, text: 'Sand the walls.' });
  const fine = Math.floor((print.layerMm * limits.cuspMaxMm * 100) / Math.max(layers.cuspMaxMm, 1e-9)) / 100;
  for (const layerMm of new Set([fine, limits.layerMinMm, limits.layerMaxMm]))
    if (layerMm >= 0.04 && layerMm !== print.layerMm && layerMm <= 0.8 * print.nozzleMm)
      found.push({
        change: { print: { layerMm } },
        text: `Print in layers of ${say(layerMm, 2)} mm instead of ${say(print.layerMm, 2)} mm.`,
      });
  return found;
}

function forGauge({ sheet }: EffectiveRecipe, { plan }: Known, provenMm: number | null): Candidate[] {
  const gaugeMm = roundUp(sheet.minFormedMm * plan.arealDrawRatio, 0.05);
  return [provenMm ?? gaugeMm, gaugeMm, 1.25 * sheet.gaugeMm, 1.5 * sheet.gaugeMm]
    .map((wanted) => Math.round(wanted * 20) / 20)
    .filter((wanted, k, all) => wanted > sheet.gaugeMm && all.indexOf(wanted) === k)
    .map((wanted) => ({
      change: { sheet: { gaugeMm: wanted } },
      text: `Take a sheet of ${say(wanted, 2)} mm instead of ${say(sheet.gaugeMm, 2)} mm.`,
    }));
}

function forNozzle({ print }: EffectiveRecipe): Candidate[] {
  return NOZZLES.filter((nozzleMm) => nozzleMm !== print.nozzleMm && print.layerMm <= 0.8 * nozzleMm).map(
    (nozzleMm) => ({
      change: { print: { nozzleMm } },
      text: `Take a nozzle of ${say(nozzleMm, 2)} mm instead of ${say(print.nozzleMm, 2)} mm.`,
    }),
  );
}
