import { analyse } from './analyse';
import type { AnalyseOptions } from './analyse-options';
import { loadMesh, type LoadOptions } from './parse/load-mesh';
import { isStep } from './parse/sniff-format';
import type { RecipeInput } from './recipe';
import type { Analysis } from './report';

/**
 * `analyse` for every format: a STEP file is first converted in a process of its own, the rest is read in place.
 * @throws UnusableInput as `analyse`, also where a conversion fails, takes too long or needs too much memory
 */
export async function analyseFile(
  bytes: Uint8Array,
  recipe: RecipeInput = {},
  options: AnalyseOptions & LoadOptions = {},
): Promise<Analysis> {
  if (!isStep(bytes)) return analyse(bytes, recipe, options);
  options.onProgress?.('convert', 0);
  const began = options.now?.();
  const mesh = await loadMesh(bytes, options);
  const ended = options.now?.();
  const { report, geometry } = analyse(bytes, recipe, { ...options, mesh });
  if (began === undefined || ended === undefined) return { report, geometry };
  return { report: { ...report, timings: { convertMs: ended - began, ...report.timings } }, geometry };
}
