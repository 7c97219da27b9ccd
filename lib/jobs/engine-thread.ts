import type { MessagePort } from 'node:worker_threads';
import { analyseFile } from '@/lib/formability/analyse-file';
import { inspectFile } from '@/lib/formability/inspect';
import type { RecipeInput, MeshUnit } from '@/lib/formability/recipe';
import type { Inspection, Report } from '@/lib/formability/report';
import { UnusableInput } from '@/lib/formability/unusable-input';
import { ENGINE_VERSION } from '@/lib/formability/version';
import { buildSheetModel } from '@/lib/stage-model/build-sheet-model';
import { buildStageModel } from '@/lib/stage-model/build-stage-model';
import { renderPicture, THUMBNAIL_SIZE } from '@/lib/stage-model/render-picture';

/** The input cannot be used: the engine's own words, as plain data that crosses threads. */
export type Refused = { ok: false; code: string; message: string; reasons: string[] };
export type Derived = { kind: 'model' | 'picture' | 'thumbnail' | 'sheet'; bytes: Uint8Array; meta: object };
export type InspectTask = { bytes: Uint8Array; unit: MeshUnit };
export type AnalyseTask = {
  bytes: Uint8Array;
  recipe: RecipeInput;
  /** Also make what the pages show of the mesh. */
  derive: boolean;
  progress?: MessagePort;
};
export type Inspected = { ok: true; inspection: Inspection } | Refused;
export type Analysed = { ok: true; engineVersion: string; report: Report; derived: Derived[] } | Refused;

/** Reads a mesh just far enough to accept or refuse it. */
export async function inspectMesh({ bytes, unit }: InspectTask): Promise<Inspected> {
  try {
    return { ok: true, inspection: await inspectFile(bytes, unit) };
  } catch (error) {
    return refused(error);
  }
}

/** The whole check run of one mesh under one recipe. No clock is lent: the same input gives the same report. */
export async function analyseMesh({ bytes, recipe, derive, progress }: AnalyseTask): Promise<Analysed> {
  try {
    const share = derive ? 0.75 : 1;
    const say = (stage: string, fraction: number) => progress?.postMessage({ stage, fraction });
    const { report, geometry } = await analyseFile(bytes, recipe, {
      sheet: true,
      onProgress: (stage, fraction) => say(stage, fraction * share),
    });
    const derived: Derived[] = [];
    if (geometry.sheet) {
      const { glb, meta } = await buildSheetModel(geometry.sheet, report.recipe.sheet.gaugeMm);
      derived.push({ kind: 'sheet', bytes: glb, meta });
    }
    if (derive) {
      say('model', 0.8);
      const { glb, meta } = await buildStageModel(geometry);
      derived.push({ kind: 'model', bytes: glb, meta });
      say('picture', 0.9);
      derived.push({ kind: 'picture', bytes: renderPicture(geometry), meta: {} });
      derived.push({ kind: 'thumbnail', bytes: renderPicture(geometry, THUMBNAIL_SIZE), meta: {} });
    }
    const answer: Analysed = { ok: true, engineVersion: ENGINE_VERSION, report, derived };
    return answer;
  } catch (error) {
    return refused(error);
  } finally {
    progress?.close();
  }
}

function refused(error: unknown): Refused {
  if (!(error instanceof UnusableInput)) throw error;
  const { code, message, reasons } = error;
  return { ok: false, code, message, reasons };
}
