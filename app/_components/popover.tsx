'use client';

import clsx from 'clsx';
import type { ReactNode } from 'react';
import {
  Dialog,
  DialogTrigger,
  Popover as AriaPopover,
  type PopoverProps as AriaPopoverProps,
} from 'react-aria-components';

export const popoverClass =
  'border border-ink bg-sheet shadow-lift data-entering:arrive max-w-[calc(100vw-1rem)]';

export interface PopoverProps extends Pick<
  AriaPopoverProps,
  'isOpen' | 'onOpenChange' | 'placement' | 'triggerRef'
> {
  /** Name for screen readers. */
  label: string;
  className?: string;
  children: ReactNode | ((close: () => void) => ReactNode);
}

/** A small panel beside what opened it; put it in `<DialogTrigger>` after a Button. */
export function Popover({ label, className, children, ...rest }: PopoverProps) {
  return (
    <AriaPopover {...rest} className={clsx(popoverClass, className)}>
      <Dialog aria-label={label} className="p-4 outline-none">
        {({ close }) => (typeof children === 'function' ? children(close) : children)}
      </Dialog>
    </AriaPopover>
  );
}

export { DialogTrigger };
