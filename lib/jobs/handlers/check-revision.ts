import { sha256 as sha256Of } from '@/lib/audit/canonical';
import type { RecipeInput } from '@/lib/formability/recipe';
import type { Report } from '@/lib/formability/report';
import { ENGINE_VERSION } from '@/lib/formability/version';
import {
  failCheck,
  finishCheck,
  loadCheckInput,
  recordDerivative,
  startCheck,
  type CheckInput,
} from '@/lib/review/record-check';
import { derivativeKey } from '@/lib/storage/keys';
import { MissingObject } from '@/lib/storage/guard-store';
import { LengthMismatch, readObject } from '@/lib/storage/read-object';
import { store } from '@/lib/storage/store';
import type { Derived } from '../engine-thread';
import { PermanentFailure } from '../job-errors';
import type { JobAtWork, JobHandler } from '../job-handler';

const contentTypes: Record<Derived['kind'], string> = {
  model: 'model/gltf-binary',
  picture: 'image/png',
  thumbnail: 'image/png',
  sheet: 'model/gltf-binary',
};

/** The check run of a revision: exactly the posted bytes, under exactly the frozen recipe. */
export const checkRevisionHandler: JobHandler = {
  timeLimitS: 600,

  async run(work) {
    const { ctx, job, fence } = work;
    const input = await loadCheckInput(ctx, job.subjectId);
    if (input.state === 'finished') return;
    await startCheck(ctx, fence, job.subjectId);
    const missing = (kind: Derived['kind']) => !input.derivativesDone.includes(kind);
    const derive = (['model', 'picture', 'thumbnail'] as const).some(missing);
    const known = input.knownReport as unknown as Report | null;
    // A sheet that could not be formed has no surface to keep.
    const sheetKept = !known?.sheet || !missing('sheet');
    // The same bytes under the same recipe by the same engine were answered before: that answer stands.
    if (known && !derive && sheetKept)
      return finishCheck(ctx, fence, job.subjectId, { report: known, engineVersion: ENGINE_VERSION });
    const bytes = await readPosted(work, input);
    const answer = await work.engine.analyse(
      { bytes, recipe: input.recipe as RecipeInput, derive },
      work.signal,
      work.onProgress,
    );
    if (!answer.ok) throw new PermanentFailure(answer.message);
    for (const one of answer.derived) await keepDerived(work, input, one);
    const { report, engineVersion } = answer;
    await finishCheck(ctx, fence, job.subjectId, { report, engineVersion });
  },

  giveUp: ({ ctx, job, fence }, reason) => failCheck(ctx, fence, job.subjectId, reason),
};

async function readPosted({ signal, onProgress }: JobAtWork, { mesh }: CheckInput) {
  onProgress('reading', 0);
  const changed = () =>
    new PermanentFailure(
      `The file in the store is not the one that was posted (${mesh.fileName}). Post the model again and tell whoever runs this system.`,
    );
  try {
    const { bytes, sha256 } = await readObject(store(), mesh.storeKey, mesh.bytes, signal);
    if (sha256 !== mesh.sha256) throw changed();
    return bytes;
  } catch (error) {
    if (error instanceof LengthMismatch || error instanceof MissingObject) throw changed();
    throw error;
  }
}

async function keepDerived({ ctx, fence, signal }: JobAtWork, input: CheckInput, one: Derived) {
  signal.throwIfAborted();
  if (input.derivativesDone.includes(one.kind)) return;
  const storeKey = derivativeKey(ctx.workspaceId);
  await store().put(storeKey, one.bytes, contentTypes[one.kind]);
  await recordDerivative(ctx, fence, input.revisionId, input.mesh.id, one.kind, {
    storeKey,
    bytes: one.bytes.byteLength,
    sha256: sha256Of(one.bytes),
    meta: one.meta as Record<string, unknown>,
    // The sheet is formed under one recipe; the other kinds show the mesh alone.
    recipeDigest: one.kind === 'sheet' ? input.recipeDigest : '',
  });
}
