'use client';

import clsx from 'clsx';
import type { ReactNode } from 'react';
import { RadioButton, RadioField, RadioGroup as AriaRadioGroup, Text } from 'react-aria-components';
import { fieldClass, FieldLabel, FieldNotes, type FieldBaseProps } from './field';

export interface RadioOption {
  value: string;
  label: ReactNode;
  help?: ReactNode;
  disabled?: boolean;
}

export interface RadioGroupProps extends FieldBaseProps {
  name?: string;
  options: readonly RadioOption[];
  value?: string | null;
  defaultValue?: string;
  onChange?: (value: string) => void;
  onBlur?: () => void;
  orientation?: 'vertical' | 'horizontal';
}

/** A few choices that are all worth seeing at once. */
export function RadioGroup(props: RadioGroupProps) {
  const {
    label,
    help,
    error,
    disabled,
    roomy,
    hideLabel,
    className,
    options,
    orientation = 'vertical',
    ...rest
  } = props;
  return (
    <AriaRadioGroup
      name={rest.name}
      value={rest.value}
      defaultValue={rest.defaultValue}
      onChange={rest.onChange}
      onBlur={rest.onBlur}
      isRequired={rest.isRequired}
      orientation={orientation}
      isDisabled={disabled}
      isInvalid={Boolean(error)}
      validationBehavior="aria"
      className={clsx(fieldClass, className)}
    >
      <FieldLabel hide={hideLabel}>{label}</FieldLabel>
      <div className={orientation === 'horizontal' ? 'flex flex-wrap gap-x-5' : 'flex flex-col'}>
        {options.map((option) => (
          <RadioField key={option.value} value={option.value} isDisabled={option.disabled}>
            <RadioButton
              className={clsx(
                'group inline-flex items-start gap-2.5 text-base data-disabled:text-slate',
                roomy ? 'min-h-12 py-3' : 'py-1 pointer-coarse:py-2.5',
              )}
            >
              <span
                aria-hidden
                className="mt-[3px] flex size-[1.0625rem] shrink-0 items-center justify-center rounded-full border border-edge bg-sheet group-hover:border-ink group-data-disabled:border-rule group-data-disabled:bg-sunk group-data-invalid:border-madder group-data-selected:border-verdigris"
              >
                <span className="size-2 rounded-full group-data-selected:bg-verdigris forced-colors:group-data-selected:bg-[Highlight]" />
              </span>
              <span>{option.label}</span>
            </RadioButton>
            {option.help ? (
              <Text slot="description" className="block pb-1 pl-7 text-sm text-slate">
                {option.help}
              </Text>
            ) : null}
          </RadioField>
        ))}
      </div>
      <FieldNotes help={help} error={error} />
    </AriaRadioGroup>
  );
}
