'use client';

import clsx from 'clsx';
import type { ReactNode, Ref } from 'react';
import { CheckboxButton, CheckboxField, SwitchButton, SwitchField } from 'react-aria-components';
import { FieldNotes, type FieldBaseProps } from './field';

export interface ToggleProps extends Omit<FieldBaseProps, 'hideLabel'> {
  label: ReactNode;
  name?: string;
  value?: boolean;
  defaultValue?: boolean;
  onChange?: (value: boolean) => void;
  onBlur?: () => void;
  ref?: Ref<HTMLInputElement>;
}

const toggleClass = (roomy?: boolean) =>
  clsx(
    'group inline-flex items-start gap-2.5 text-base text-ink data-disabled:text-slate',
    roomy ? 'min-h-12 py-3' : 'py-1 pointer-coarse:py-2.5',
  );

function common({
  name,
  value,
  defaultValue,
  onChange,
  onBlur,
  disabled,
  isRequired,
  error,
  ref,
  className,
}: ToggleProps) {
  return {
    name,
    isSelected: value,
    defaultSelected: defaultValue,
    onChange,
    onBlur,
    isDisabled: disabled,
    isRequired,
    isInvalid: Boolean(error),
    inputRef: ref,
    className: clsx('flex flex-col gap-0.5', className),
  };
}

/** One thing that is ticked or not, and takes effect when the form is sent. */
export function Checkbox(props: ToggleProps) {
  return (
    <CheckboxField {...common(props)} validationBehavior="aria">
      <CheckboxButton className={toggleClass(props.roomy)}>
        {({ isSelected, isIndeterminate }) => (
          <>
            <span
              aria-hidden
              className={clsx(
                'mt-0.5 flex size-[1.125rem] shrink-0 items-center justify-center border bg-sheet',
                'group-data-invalid:border-madder group-data-selected:border-verdigris group-data-selected:bg-verdigris group-data-selected:text-on-verdigris',
                'border-edge group-hover:border-ink group-data-disabled:border-rule group-data-disabled:bg-sunk group-data-disabled:text-slate',
              )}
            >
              {isIndeterminate ? (
                <span className="h-0.5 w-2.5 bg-current" />
              ) : isSelected ? (
                <svg viewBox="0 0 12 10" className="w-3 fill-none stroke-current stroke-2">
                  <path d="m1 5 3.5 3.5L11 1" />
                </svg>
              ) : null}
            </span>
            <span>{props.label}</span>
          </>
        )}
      </CheckboxButton>
      <FieldNotes help={props.help} error={props.error} />
    </CheckboxField>
  );
}

/** One setting that takes effect at once. */
export function Switch(props: ToggleProps) {
  return (
    <SwitchField {...common(props)} validationBehavior="aria">
      <SwitchButton className={toggleClass(props.roomy)}>
        <span
          aria-hidden
          className="mt-0.5 flex h-5 w-9 shrink-0 items-center border border-edge bg-sheet p-[3px] group-hover:border-ink group-data-disabled:border-rule group-data-disabled:bg-sunk group-data-selected:border-verdigris group-data-selected:bg-verdigris"
        >
          <span className="size-3 bg-edge transition-transform duration-100 group-data-selected:translate-x-4 group-data-selected:bg-on-verdigris forced-colors:bg-[ButtonText]" />
        </span>
        <span>{props.label}</span>
      </SwitchButton>
      <FieldNotes help={props.help} error={props.error} />
    </SwitchField>
  );
}
