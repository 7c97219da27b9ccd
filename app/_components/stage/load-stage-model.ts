import type { StageModelData } from './decode-stage-model';
import { inWorker, loadOnce } from './load-once';

const models = new Map<string, Promise<StageModelData>>();

/**
 * Fetches and decodes a stage model once per address, off the main thread where the browser allows it.
 * The stage and the profile strip share it. Rejects with a sentence that can be shown.
 */
export function loadStageModel(url: string): Promise<StageModelData> {
  return loadOnce(models, url, () => {
    const absolute = new URL(url, document.baseURI).href;
    const start = () => new Worker(new URL('./stage-model.worker.ts', import.meta.url), { type: 'module' });
    return inWorker<StageModelData>(start, absolute, 'The model could not be read in the background.').catch(
      () => loadHere(absolute),
    );
  });
}

async function loadHere(url: string): Promise<StageModelData> {
  const { fetchStageModel } = await import('./decode-stage-model');
  return fetchStageModel(url);
}
