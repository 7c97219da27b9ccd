import type { StageModelData } from './decode-stage-model';

/**
 * What makes an address another model. A store's signed address changes its signature at every answer while its path
 * names the same bytes, so the query of such an address does not count.
 */
export function stageModelKey(url: string): string {
  return /[?&]x-amz-signature=/i.test(url) ? url.slice(0, url.indexOf('?')) : url;
}

const models = new Map<string, Promise<StageModelData>>();

/**
 * Fetches and decodes a stage model once per address, off the main thread where the browser allows it.
 * The stage and the profile strip share it. Rejects with a sentence that can be shown.
 */
export function loadStageModel(url: string): Promise<StageModelData> {
  const key = stageModelKey(url);
  const known = models.get(key);
  if (known) return known;
  const absolute = new URL(url, document.baseURI).href;
  const model = loadInWorker(absolute).catch(() => loadHere(absolute));
  models.set(key, model);
  model.catch(() => models.delete(key));
  // Two revisions side by side are the most that a page compares; older ones are fetched again.
  if (models.size > 3) models.delete(models.keys().next().value!);
  return model;
}

function loadInWorker(url: string): Promise<StageModelData> {
  return new Promise((resolve, reject) => {
    const worker = new Worker(new URL('./stage-model.worker.ts', import.meta.url), { type: 'module' });
    const done = (act: () => void) => {
      worker.terminate();
      act();
    };
    worker.onmessage = ({ data }: MessageEvent<{ model?: StageModelData; problem?: string }>) =>
      done(() => (data.model ? resolve(data.model) : reject(new Error(data.problem))));
    worker.onerror = () => done(() => reject(new Error('The model could not be read in the background.')));
    worker.postMessage(url);
  });
}

async function loadHere(url: string): Promise<StageModelData> {
  const { fetchStageModel } = await import('./decode-stage-model');
  return fetchStageModel(url);
}
