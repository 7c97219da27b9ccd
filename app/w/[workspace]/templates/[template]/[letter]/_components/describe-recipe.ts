import { FILAMENTS } from '@/lib/formability/materials/filaments';
import { SHEETS } from '@/lib/formability/materials/sheets';
import { formatLength } from '@/app/_components/format-figure';
import type { Units } from '@/app/_components/preferences';

type Part = Record<string, unknown> | undefined;

const nameIn = (table: object, id: unknown): string => {
  const entry = (table as Record<string, { name?: string } | undefined>)[String(id)];
  return entry?.name ?? String(id ?? 'unknown');
};

/** Lengths with as many decimals as they were given, up to two: `0.8 mm`, `0.35 mm`. */
function short(value: unknown, units: Units): string {
  if (typeof value !== 'number') return '';
  const digits = [0, 1, 2].find((n) => Math.abs(value - Number(value.toFixed(n))) < 1e-9) ?? 2;
  // Half a thousandth of an inch is as fine as gauges and nozzles are told apart.
  return formatLength(value, units, units === 'in' ? 2 : Math.max(1, digits));
}

/** The two fields of the title block that the recipe fills: the sheet, and how the template is printed. */
export function describeRecipe(recipe: Record<string, unknown>, units: Units) {
  const sheet = recipe.sheet as Part;
  const print = recipe.print as Part;
  return {
    sheet: `${nameIn(SHEETS, sheet?.material)} ${short(sheet?.gaugeMm, units)}`.trim(),
    template: `${nameIn(FILAMENTS, print?.material)}; ${short(print?.nozzleMm, units)} nozzle`,
  };
}

/** A limit of the recipe, in degrees or millimetres; `fallback` where the recipe does not name it. */
export function limitOf(recipe: Record<string, unknown>, key: string, fallback: number): number {
  const value = (recipe.limits as Part)?.[key];
  return typeof value === 'number' && Number.isFinite(value) ? value : fallback;
}
