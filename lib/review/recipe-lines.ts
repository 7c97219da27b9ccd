import { FILAMENTS } from '@/lib/formability/materials/filaments';
import { SHEETS } from '@/lib/formability/materials/sheets';
import type { EffectiveRecipe } from '@/lib/formability/recipe';

const yesNo = (value: boolean) => (value ? 'yes' : 'no');

/** A frozen recipe in words and figures, as a signer reads it. Lengths in mm: the units that were agreed. */
export function recipeLines(body: Record<string, unknown>): { label: string; value: string }[] {
  const { machine, sheet, print, run } = body as unknown as EffectiveRecipe;
  const agents = { none: 'none', 'dry-ptfe': 'dry PTFE' };
  return [
    { label: 'Sheet', value: `${SHEETS[sheet.material]?.name ?? sheet.material}, ${sheet.gaugeMm} mm` },
    { label: 'Forming temperature', value: `${sheet.formingC} °C` },
    { label: 'Thinnest allowed', value: `${sheet.minFormedMm} mm` },
    { label: 'Filament', value: FILAMENTS[print.material]?.name ?? print.material },
    { label: 'Nozzle', value: `${print.nozzleMm} mm` },
    { label: 'Layer height', value: `${print.layerMm} mm` },
    { label: 'Shell and top', value: `${print.shellMm} mm, ${print.topMm} mm` },
    { label: 'Infill', value: `${print.infillPercent} %, ${print.infillPattern}` },
    { label: 'Walls sanded', value: yesNo(print.sanded) },
    { label: 'Release agent', value: agents[print.releaseAgent] ?? print.releaseAgent },
    {
      label: 'Machine',
      value: `forming area ${machine.formingAreaMm.join(' × ')} mm, height to ${machine.maxHeightMm} mm, ${machine.pressureBar} bar`,
    },
    { label: 'Run', value: `${run.pulls} pulls, one in ${run.cycleS} s, from ${run.ambientC} °C` },
  ];
}
