'use client';

import type { ComponentProps } from 'react';
import { Button } from 'react-aria-components';

/** An action in the quiet line below an item: reads like a link, is a button, at least 24 px high. */
export function MetaButton({ className, ...rest }: ComponentProps<typeof Button> & { className?: string }) {
  return (
    <Button
      {...rest}
      className={`min-h-6 py-0.5 text-left text-sm text-verdigris underline decoration-verdigris/50 underline-offset-3 hover:decoration-current data-disabled:text-slate data-pending:cursor-progress pointer-coarse:py-2.5 print:hidden ${className ?? ''}`}
    />
  );
}
