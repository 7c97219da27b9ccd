import type { ReactNode } from 'react';
import { StateShape } from './state-shape';

/** A caution beside a figure that someone may act on: heat, pressure, fumes, food contact, life. */
export function Caution({ title = 'Caution', children }: { title?: ReactNode; children: ReactNode }) {
  return (
    <aside className="flex gap-3 border border-ochre bg-ochre-wash px-4 py-3 text-sm">
      <StateShape shape="triangle-open" className="mt-0.5 size-4 text-ochre" />
      <div className="min-w-0">
        <strong className="font-semibold text-ochre-ink">{title}. </strong>
        {children}
      </div>
    </aside>
  );
}
