import { fetchSheetModel, sheetTransferables } from './decode-sheet-model';
import type { Surface } from './refine-surface';

/** Address, nodes and the template's surface in, the decoded sheet (or the problem in words) out. */
self.onmessage = async ({ data }: MessageEvent<SheetRequest>) => {
  try {
    const sheet = await fetchSheetModel(data.url, data.nodes, data.template);
    self.postMessage({ made: sheet }, { transfer: sheetTransferables(sheet) });
  } catch (error) {
    self.postMessage({ problem: error instanceof Error ? error.message : String(error) });
  }
};

export interface SheetRequest {
  url: string;
  nodes: [number, number];
  template: Surface;
}
