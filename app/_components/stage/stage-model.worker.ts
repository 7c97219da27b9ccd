import { fetchStageModel, transferables } from './decode-stage-model';

/** One address in, one decoded model (or the problem in words) out. */
self.onmessage = async ({ data: url }: MessageEvent<string>) => {
  try {
    const model = await fetchStageModel(url);
    self.postMessage({ made: model }, { transfer: transferables(model) });
  } catch (error) {
    self.postMessage({ problem: error instanceof Error ? error.message : String(error) });
  }
};
