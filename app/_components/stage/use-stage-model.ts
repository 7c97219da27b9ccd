'use client';

import { useEffect, useRef, useState } from 'react';
import type { StageModelData } from './decode-stage-model';
import { addressKey } from './load-once';
import { loadStageModel } from './load-stage-model';

/** The decoded model of an address, or why there is none; both null while it is on its way. `attempt` asks anew. */
export function useStageModel(
  url: string,
  attempt = 0,
): { model: StageModelData | null; problem: string | null } {
  const [loaded, setLoaded] = useState<{ key: string; model?: StageModelData; problem?: string } | null>(
    null,
  );
  const key = addressKey(url);
  const address = useRef(url);
  useEffect(() => {
    address.current = url;
  });
  useEffect(() => {
    let current = true;
    loadStageModel(address.current).then(
      (model) => current && setLoaded({ key, model }),
      (error: Error) => current && setLoaded({ key, problem: error.message }),
    );
    return () => {
      current = false;
    };
  }, [key, attempt]);
  const now = loaded?.key === key ? loaded : null;
  return { model: now?.model ?? null, problem: now?.problem ?? null };
}
