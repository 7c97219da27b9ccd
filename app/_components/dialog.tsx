'use client';

import clsx from 'clsx';
import type { ReactNode } from 'react';
import {
  Button as AriaButton,
  Dialog as AriaDialog,
  DialogTrigger,
  Heading,
  Modal,
  ModalOverlay,
} from 'react-aria-components';

export interface DialogProps {
  title: ReactNode;
  /** Open state, when the dialog is opened from code; leave out inside `<DialogTrigger>`. */
  isOpen?: boolean;
  onOpenChange?: (isOpen: boolean) => void;
  /** `alertdialog` for a decision that cannot be put aside. */
  role?: 'dialog' | 'alertdialog';
  /** While true, Escape and the close button do nothing: used while a signature is on its way. */
  isBusy?: boolean;
  size?: 'narrow' | 'normal' | 'wide';
  /** Buttons of the last line, the main one last. */
  actions?: ReactNode | ((close: () => void) => ReactNode);
  children: ReactNode | ((close: () => void) => ReactNode);
}

const widths = { narrow: 'sm:max-w-md', normal: 'sm:max-w-xl', wide: 'sm:max-w-3xl' };

/** A modal dialog: labelled, focus kept inside, Escape closes, focus returns to what opened it. */
export function Dialog(props: DialogProps) {
  const {
    title,
    isOpen,
    onOpenChange,
    role = 'dialog',
    isBusy = false,
    size = 'normal',
    actions,
    children,
  } = props;
  return (
    <ModalOverlay
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      isDismissable={false}
      isKeyboardDismissDisabled={isBusy}
      className="fixed inset-0 z-40 flex h-(--visual-viewport-height) items-end justify-center bg-veil/50 sm:items-center sm:p-6"
    >
      <Modal
        className={clsx(
          'max-h-full w-full overflow-auto border border-ink bg-sheet shadow-lift data-entering:arrive',
          widths[size],
        )}
      >
        <AriaDialog role={role} className="flex flex-col outline-none">
          {({ close }) => (
            <>
              <header className="flex items-center justify-between gap-4 border-b border-rule px-5 py-3">
                <Heading slot="title" className="text-lg font-semibold">
                  {title}
                </Heading>
                <AriaButton
                  aria-label="Close"
                  isDisabled={isBusy}
                  onPress={close}
                  className="-mr-2 flex size-8 shrink-0 items-center justify-center text-slate hover:text-ink data-disabled:opacity-40 pointer-coarse:size-11"
                >
                  <svg aria-hidden viewBox="0 0 12 12" className="w-3 stroke-current stroke-[1.5]">
                    <path d="m1 1 10 10M11 1 1 11" />
                  </svg>
                </AriaButton>
              </header>
              <div className="px-5 py-4">{typeof children === 'function' ? children(close) : children}</div>
              {actions ? (
                <footer className="flex flex-wrap justify-end gap-2.5 border-t border-rule px-5 py-3">
                  {typeof actions === 'function' ? actions(close) : actions}
                </footer>
              ) : null}
            </>
          )}
        </AriaDialog>
      </Modal>
    </ModalOverlay>
  );
}

export { DialogTrigger };
