'use client';

import { useEffect, useState } from 'react';
import type { SheetModelMeta } from '@/lib/stage-model/sheet-model-meta';
import type { SheetModelData } from './decode-sheet-model';
import type { StageModelData } from './decode-stage-model';
import { addressKey, inWorker, loadOnce } from './load-once';
import type { SheetRequest } from './sheet-model.worker';

const sheets = new Map<string, Promise<SheetModelData>>();

/** Fetched and laid over the template once per address, off the main thread where the browser allows it. */
function loadSheet(request: SheetRequest): Promise<SheetModelData> {
  return loadOnce(sheets, request.url, () => {
    const absolute = { ...request, url: new URL(request.url, document.baseURI).href };
    const start = () => new Worker(new URL('./sheet-model.worker.ts', import.meta.url), { type: 'module' });
    return inWorker<SheetModelData>(start, absolute, 'The sheet could not be read in the background.').catch(
      async () => {
        const { fetchSheetModel } = await import('./decode-sheet-model');
        return fetchSheetModel(absolute.url, absolute.nodes, absolute.template);
      },
    );
  });
}

/** The formed sheet over a stage model; null while it is on its way, and where there is none or it cannot be had. */
export function useSheetModel(
  sheet: { url: string; meta: SheetModelMeta } | null | undefined,
  model: StageModelData | null,
): SheetModelData | null {
  const [loaded, setLoaded] = useState<{ key: string; model: StageModelData; sheet: SheetModelData } | null>(
    null,
  );
  const url = sheet?.url ?? null;
  const key = url && addressKey(url);
  const nodes = sheet?.meta.nodes.join() ?? '';
  useEffect(() => {
    if (!url || !key || !model) return undefined;
    let current = true;
    const { positions, normals, flags, index } = model;
    const [along, across] = nodes.split(',').map(Number);
    loadSheet({ url, nodes: [along, across], template: { positions, normals, flags, index } }).then(
      (found) => current && setLoaded({ key, model, sheet: found }),
      // The model itself is what the page is about; without its sheet the map says that there is none.
      () => undefined,
    );
    return () => {
      current = false;
    };
    // The address changes its signature at every answer; the key is what names the bytes.
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [key, model, nodes]);
  return loaded && loaded.key === key && loaded.model === model ? loaded.sheet : null;
}
