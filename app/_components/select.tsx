'use client';

import clsx from 'clsx';
import type { Ref } from 'react';
import {
  Button,
  ListBox,
  ListBoxItem,
  Popover,
  Select as AriaSelect,
  SelectValue,
} from 'react-aria-components';
import { fieldClass, FieldLabel, FieldNotes, inputClass, type FieldBaseProps } from './field';

export interface SelectOption {
  value: string;
  label: string;
  /** A second, quieter line. */
  detail?: string;
  disabled?: boolean;
}

export interface SelectProps extends FieldBaseProps {
  name?: string;
  options: readonly SelectOption[];
  value?: string | null;
  defaultValue?: string;
  onChange?: (value: string) => void;
  onBlur?: () => void;
  placeholder?: string;
  optional?: boolean;
  ref?: Ref<HTMLButtonElement>;
}

export function Select(props: SelectProps) {
  const {
    label,
    help,
    error,
    disabled,
    roomy,
    hideLabel,
    className,
    options,
    optional,
    ref,
    onChange,
    onBlur,
    ...rest
  } = props;
  const { value, defaultValue, placeholder = 'Choose one', isRequired, name } = rest;
  return (
    <AriaSelect
      name={name}
      value={value}
      defaultValue={defaultValue}
      placeholder={placeholder}
      isRequired={isRequired}
      onChange={(key) => (key == null ? undefined : onChange?.(String(key)))}
      onBlur={onBlur}
      isDisabled={disabled}
      isInvalid={Boolean(error)}
      validationBehavior="aria"
      disabledKeys={options.filter((option) => option.disabled).map((option) => option.value)}
      className={clsx(fieldClass, className)}
    >
      <FieldLabel hide={hideLabel} optional={optional}>
        {label}
      </FieldLabel>
      <Button
        ref={ref}
        className={inputClass(
          roomy,
          clsx('flex items-center justify-between gap-2 text-left', error && 'border-madder border-l-4'),
        )}
      >
        <SelectValue className="min-w-0 truncate data-placeholder:text-slate">
          {({ selectedText, isPlaceholder, defaultChildren }) =>
            isPlaceholder ? defaultChildren : selectedText
          }
        </SelectValue>
        <svg aria-hidden viewBox="0 0 10 6" className="w-2.5 shrink-0 fill-none stroke-current stroke-[1.5]">
          <path d="m1 1 4 4 4-4" />
        </svg>
      </Button>
      <FieldNotes help={help} error={error} />
      <Popover className="min-w-(--trigger-width) max-w-[min(28rem,calc(100vw-1rem))] border border-ink bg-sheet shadow-lift data-entering:arrive">
        <ListBox
          className="max-h-80 overflow-auto py-1 outline-none"
          items={options.map((option) => ({ ...option, id: option.value }))}
        >
          {(option) => (
            <ListBoxItem
              id={option.id}
              textValue={option.label}
              className={clsx(
                'flex cursor-pointer items-start gap-2 px-2.5 py-1.5 text-base outline-offset-[-2px]',
                'data-focused:bg-verdigris-wash data-disabled:text-slate data-selected:font-semibold pointer-coarse:py-2.5',
              )}
            >
              {({ isSelected }) => (
                <>
                  <span aria-hidden className="w-3 shrink-0 text-verdigris">
                    {isSelected ? '✓' : ''}
                  </span>
                  <span className="min-w-0">
                    {option.label}
                    {option.detail ? (
                      <span className="block text-sm font-normal text-slate">{option.detail}</span>
                    ) : null}
                  </span>
                </>
              )}
            </ListBoxItem>
          )}
        </ListBox>
      </Popover>
    </AriaSelect>
  );
}
