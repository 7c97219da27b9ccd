'use client';

import type { ReactNode, Ref } from 'react';
import {
  Button as AriaButton,
  ProgressBar,
  type ButtonProps as AriaButtonProps,
} from 'react-aria-components';
import { buttonClass, type ButtonSize, type ButtonVariant } from './button-class';

export interface ButtonProps extends Omit<AriaButtonProps, 'className' | 'style' | 'children'> {
  variant?: ButtonVariant;
  /** `roomy` is at least 44 px, for production pages and dirty hands. */
  size?: ButtonSize;
  /** While true the button keeps its width and focus, cannot be pressed, and says so to screen readers. */
  isPending?: boolean;
  className?: string;
  children: ReactNode;
  ref?: Ref<HTMLButtonElement>;
}

export function Button({ variant = 'quiet', size = 'normal', className, children, ...rest }: ButtonProps) {
  return (
    <AriaButton {...rest} className={buttonClass(variant, size, className)}>
      {children}
      {rest.isPending ? (
        <ProgressBar aria-label="Working" isIndeterminate className="inline-flex">
          <span
            aria-hidden
            className="inline-block size-3.5 animate-spin rounded-full border-2 border-current border-r-transparent"
          />
        </ProgressBar>
      ) : null}
    </AriaButton>
  );
}
