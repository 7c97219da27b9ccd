'use client';

import { useId } from 'react';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';
import { usePreferences } from '../preferences-context';
import { formatArea } from './format-area';

/** What the strokes of the undercut map mean, and how much of it there is. */
export function UndercutLegend({ meta }: { meta: StageModelMeta }) {
  const { units } = usePreferences();
  const hatch = useId();
  const area = meta.areaMm2.undercut;
  return (
    <figure className="w-full max-w-80 bg-sheet/85">
      <figcaption className="text-xs font-semibold">Undercut</figcaption>
      <p className="mt-1 flex items-center gap-2 text-xs text-slate">
        <svg aria-hidden viewBox="0 0 28 14" className="h-3.5 w-7 shrink-0 text-madder">
          <pattern
            id={hatch}
            width="5"
            height="5"
            patternUnits="userSpaceOnUse"
            patternTransform="rotate(45)"
          >
            <rect width="1.8" height="5" fill="currentColor" />
          </pattern>
          <rect x="0.5" y="0.5" width="27" height="13" fill={`url(#${hatch})`} className="stroke-current" />
        </svg>
        {area > 0 ? (
          <span className="text-madder">
            {formatArea(area, units)} cannot be seen from above and would lock the part.
          </span>
        ) : (
          <span>No face is hidden from above. Struck faces would lock the part.</span>
        )}
      </p>
    </figure>
  );
}
