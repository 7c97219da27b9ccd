'use client';

import { StateShape } from '../state-shape';
import { useLive } from './live-provider';

const words = {
  polling: 'Live updates are off, checking every 15 seconds.',
  offline:
    'No connection. What you see is what was here last; notes that you write are kept and sent when it is back.',
};

/** Says plainly that the page is not live. The region stands there from the start so that it is read out. */
export function LiveBanner() {
  const { status } = useLive();
  const shown = status === 'polling' || status === 'offline' ? words[status] : null;
  return (
    <div role="status" className="print:hidden">
      {shown ? (
        <p className="mb-3 flex items-start gap-2 border border-ochre bg-ochre-wash px-3 py-2 text-base">
          <StateShape shape="triangle-open" className="mt-1 size-3.5 text-ochre" />
          {shown}
        </p>
      ) : null}
    </div>
  );
}
