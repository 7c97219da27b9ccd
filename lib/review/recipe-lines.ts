import { LIMIT_KEYS, LIMIT_RULES } from '@/lib/formability/limits';
import { FILAMENTS } from '@/lib/formability/materials/filaments';
import { SHEETS } from '@/lib/formability/materials/sheets';
import type { EffectiveRecipe } from '@/lib/formability/recipe';

const yesNo = (value: boolean) => (value ? 'yes' : 'no');

/** A frozen recipe in words and figures, as a signer reads it. Lengths in mm: the units that were agreed. */
export function recipeLines(body: Record<string, unknown>): { label: string; value: string }[] {
  const { mesh, machine, sheet, print, run, costs, limits } = body as unknown as EffectiveRecipe;
  const { slope, offsetMm, minOpenMm } = print.holeModel;
  const agents = { none: 'none', 'dry-ptfe': 'dry PTFE' };
  return [
    { label: 'Sheet', value: `${SHEETS[sheet.material]?.name ?? sheet.material}, ${sheet.gaugeMm} mm` },
    { label: 'Forming temperature', value: `${sheet.formingC} °C` },
    { label: 'Thinnest allowed', value: `${sheet.minFormedMm} mm` },
    { label: 'Filament', value: FILAMENTS[print.material]?.name ?? print.material },
    { label: 'Nozzle', value: `${print.nozzleMm} mm, lines of ${print.lineMm} mm` },
    { label: 'Layer height', value: `${print.layerMm} mm` },
    { label: 'Shell and top', value: `${print.shellMm} mm, ${print.topMm} mm` },
    { label: 'Infill', value: `${print.infillPercent} %, ${print.infillPattern}` },
    { label: 'Walls sanded', value: yesNo(print.sanded) },
    { label: 'Release agent', value: agents[print.releaseAgent] ?? print.releaseAgent },
    {
      label: 'Machine',
      value: `forming area ${machine.formingAreaMm.join(' × ')} mm, height to ${machine.maxHeightMm} mm, ${machine.pressureBar} bar`,
    },
    {
      label: 'Clamp frame',
      value: machine.frameMm
        ? `opening ${machine.frameMm.join(' × ')} mm`
        : `${machine.frameMarginMm} mm of free sheet round the template`,
    },
    { label: 'Run', value: `${run.pulls} pulls, one in ${run.cycleS} s, from ${run.ambientC} °C` },
    {
      label: 'Holes print',
      value: `${slope} × drawn ${offsetMm < 0 ? '−' : '+'} ${Math.abs(offsetMm)} mm, open from ${minOpenMm} mm`,
    },
    { label: 'Mesh read in', value: mesh.unit },
    {
      label: 'Rates',
      value: `${costs.materialPerKg} per kg, ${costs.machinePerHour} per hour, ${costs.labour} for handling, in the studio’s currency`,
    },
    { label: 'Limits', value: ownLimits(limits) },
  ];
}

/** The limits that the studio moved, each with its own value; the others stand as the engine has them. */
function ownLimits(limits: EffectiveRecipe['limits']): string {
  const moved = LIMIT_KEYS.filter((key) => limits[key] !== LIMIT_RULES[key].value);
  if (moved.length === 0) return 'as the engine has them';
  return moved
    .map((key) => `${LIMIT_RULES[key].label}: ${limits[key]} ${LIMIT_RULES[key].unit}`.trim())
    .join('; ');
}
