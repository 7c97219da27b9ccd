'use client';

import { lazy, Suspense, useSyncExternalStore } from 'react';
import { probeWebgl } from './probe-webgl';
import { StageFallback } from './stage-fallback';
import { StagePicture } from './stage-picture';
import type { StageProps } from './stage-props';

// Never rendered on the server: what the browser can do is not known there.
const StageView = lazy(() => import('./stage-view'));

const never = () => () => {};
const hasWebgl = () => probeWebgl().able;

/**
 * The template on its stage. The 3D code is fetched only where a stage is shown and the browser can draw it; until then
 * the picture stands in, and where it cannot, the picture and the figures are what is shown.
 */
export function Stage(props: StageProps) {
  const able = useSyncExternalStore<boolean | null>(never, hasWebgl, () => null);
  if (able === false) {
    return (
      <StageFallback
        {...props}
        reason="This browser cannot draw the model in 3D (WebGL is off or missing). The picture and the figures come from the same check."
      />
    );
  }
  if (able === null) return <StagePicture {...props} />;
  return (
    <Suspense fallback={<StagePicture {...props} />}>
      <StageView {...props} />
    </Suspense>
  );
}
