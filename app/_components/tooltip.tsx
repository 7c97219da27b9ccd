'use client';

import type { ReactElement, ReactNode } from 'react';
import { Focusable, Tooltip as AriaTooltip, TooltipTrigger } from 'react-aria-components';

export interface TooltipProps {
  /** A few words; never the only place where something needed is said. */
  text: ReactNode;
  placement?: 'top' | 'bottom' | 'left' | 'right';
  /** A `Button` of ours or of react-aria-components. */
  children: ReactElement;
}

/** Appears on hover and on keyboard focus, stays while pointed at, goes with Escape. */
export function Tooltip({ text, placement = 'top', children }: TooltipProps) {
  return (
    <TooltipTrigger delay={500} closeDelay={150}>
      {children}
      <AriaTooltip
        placement={placement}
        offset={6}
        className="max-w-72 border border-ink bg-ink px-2.5 py-1 text-sm text-paper data-entering:arrive"
      >
        {text}
      </AriaTooltip>
    </TooltipTrigger>
  );
}

export { Focusable };
