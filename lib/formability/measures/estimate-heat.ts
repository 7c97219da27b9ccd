import { FILAMENT_IDS, FILAMENTS, type FilamentId, type FilamentMaterial } from '../materials/filaments';
import { SHEETS } from '../materials/sheets';
import { contactC, coolingTimeS, type ThermalBody } from '../physics/conduction';
import { halfSpaceRiseK, heatOfPull, lumpedRiseK, type Cycling } from '../physics/cycle-heating';
import type { EffectiveRecipe } from '../recipe';
import type { HeatReport } from '../report-forming';

/** Distance kept from the softening of amorphous polymers, K (common practice, no source). */
const MARGIN_K = 10;
/** A cycle longer than this is no production. */
const LONGEST_CYCLE_S = 3600;

/**
 * Surface limit of a template, °C: amorphous, 10 K below the lower of HDT B and glass transition; semi-crystalline, whose
 * modulus stands on a plateau, HDT A, as for loaded thin skins. Common practice, no source; HDT by ISO 75.
 */
export function softeningLimitC(material: FilamentMaterial): number {
  return material.semiCrystalline
    ? material.hdtAC.value
    : Math.min(material.hdtBC.value, material.glassC.value) - MARGIN_K;
}

/**
 * Temperature of the template's surface over the planned pulls. Contact: two semi-infinite solids. Build-up: the whole
 * heat of each sheet goes into the printed shell, which over a few cycles warms through as one lump and loses heat to the
 * air (the infill behind it carries hardly any); a solid print is a half-space that keeps all of it, an upper bound.
 * After each pull the larger of contact and build-up; never hotter than the sheet.
 */
export function estimateHeat(recipe: EffectiveRecipe): Omit<HeatReport, 'transient'> {
  const { run, sheet, print } = recipe;
  const filament = FILAMENTS[print.material];
  const polymer = SHEETS[sheet.material];
  const { tool, body } = thermalBodies(recipe);
  const contact = contactC(body, sheet.formingC, tool, run.ambientC);
  const limitC = softeningLimitC(filament);
  const heatJm2 = heatOfPull(
    body,
    sheet.gaugeMm,
    sheet.formingC,
    Math.min(sheet.formingC, polymer.demouldC.value),
  );
  const cycling: Cycling = { tool, shellMm: print.shellMm, heatJm2, cycleS: run.cycleS };
  const model = print.infillPercent < 100 ? 'lumped' : '1-d';
  const cold = run.ambientC < polymer.demouldC.value && sheet.formingC > polymer.demouldC.value;
  const peakAfter = (at: Cycling, pull: number) => {
    const rise = model === 'lumped' ? lumpedRiseK(at, pull) : halfSpaceRiseK(at, pull);
    return Math.min(sheet.formingC, Math.max(contact, run.ambientC + rise));
  };
  const peakC = peaks(cycling, run.pulls, model, (rise) =>
    Math.min(sheet.formingC, Math.max(contact, run.ambientC + rise)),
  );
  const tooHot = peakC.findIndex((peak) => peak > limitC);
  return {
    contactC: contact,
    limitC,
    peakC,
    pullsBeforeRest: tooHot < 0 ? run.pulls : tooHot,
    cycleThatHoldsS: cycleThatHolds(cycling, (at) => peakAfter(at, run.pulls) <= limitC),
    model,
    coolS: cold
      ? coolingTimeS(body, sheet.gaugeMm, {
          sheetC: sheet.formingC,
          toolC: run.ambientC,
          demouldC: polymer.demouldC.value,
        })
      : null,
  };
}

/** Template and sheet as bodies that heat flows through. */
export function thermalBodies({ sheet, print }: EffectiveRecipe): { tool: ThermalBody; body: ThermalBody } {
  const filament = FILAMENTS[print.material];
  const polymer = SHEETS[sheet.material];
  return {
    tool: {
      conductivityWmK: filament.conductivityWmK.value,
      densityKgM3: filament.densityGcm3.value * 1000,
      heatJkgK: filament.heatJkgK.value,
    },
    body: {
      conductivityWmK: polymer.conductivityWmK.value,
      densityKgM3: polymer.densityKgM3.value,
      heatJkgK: polymer.heatJkgK.value,
    },
  };
}

/** After pull 1…N; the half-space's sum is carried on from pull to pull. */
function peaks(
  cycling: Cycling,
  pulls: number,
  model: HeatReport['model'],
  surface: (riseK: number) => number,
): number[] {
  const first = halfSpaceRiseK(cycling, 1);
  let sum = 0;
  return Array.from({ length: pulls }, (_, n) => {
    sum += 1 / Math.sqrt(n + 1);
    return surface(model === 'lumped' ? lumpedRiseK(cycling, n + 1) : first * sum);
  });
}

/** Shortest cycle from the planned one up at which all pulls hold, in whole seconds; null where none does. */
function cycleThatHolds(cycling: Cycling, holds: (at: Cycling) => boolean): number | null {
  if (holds(cycling)) return cycling.cycleS;
  let [low, high] = [cycling.cycleS, LONGEST_CYCLE_S];
  if (!holds({ ...cycling, cycleS: high })) return null;
  while (high - low > 0.5) {
    const middle = (low + high) / 2;
    if (holds({ ...cycling, cycleS: middle })) high = middle;
    else low = middle;
  }
  return Math.ceil(high);
}

/** Hottest surface of the planned pulls, °C. */
export function hottestC(heat: Pick<HeatReport, 'peakC' | 'contactC'>): number {
  return heat.peakC.reduce((most, peak) => Math.max(most, peak), heat.contactC);
}

/**
 * Other filaments that stay below their softening by at least a margin over the same pulls. A resin for vats is no choice
 * on a filament printer.
 */
export function filamentsThatHold(
  recipe: EffectiveRecipe,
  leastMarginK: number,
): { id: FilamentId; marginK: number }[] {
  return FILAMENT_IDS.filter((id) => id !== recipe.print.material && id !== 'resin-ht')
    .map((id) => {
      const heat = estimateHeat({ ...recipe, print: { ...recipe.print, material: id } });
      return { id, marginK: heat.limitC - hottestC(heat) };
    })
    .filter(({ marginK }) => marginK >= leastMarginK);
}
