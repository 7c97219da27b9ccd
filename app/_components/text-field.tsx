'use client';

import clsx from 'clsx';
import type { HTMLInputTypeAttribute, ReactNode, Ref } from 'react';
import {
  Input,
  TextArea as AriaTextArea,
  TextField as AriaTextField,
  type TextFieldProps as AriaProps,
} from 'react-aria-components';
import { fieldClass, FieldLabel, FieldNotes, inputClass, type FieldBaseProps } from './field';

type Shared = FieldBaseProps &
  Pick<
    AriaProps,
    | 'name'
    | 'value'
    | 'defaultValue'
    | 'onChange'
    | 'onBlur'
    | 'onFocus'
    | 'autoComplete'
    | 'autoFocus'
    | 'inputMode'
    | 'maxLength'
    | 'minLength'
    | 'isReadOnly'
    | 'spellCheck'
    | 'id'
  >;

export interface TextFieldProps extends Shared {
  type?: HTMLInputTypeAttribute;
  placeholder?: string;
  /** Shown inside the control's right edge, such as `mm` or `°C`. */
  unit?: ReactNode;
  /** Figures and codes in the mono face. */
  mono?: boolean;
  optional?: boolean;
  ref?: Ref<HTMLInputElement>;
}

export function TextField(props: TextFieldProps) {
  const {
    label,
    help,
    error,
    disabled,
    roomy,
    hideLabel,
    className,
    unit,
    mono,
    optional,
    placeholder,
    ref,
    ...rest
  } = props;
  return (
    <AriaTextField
      {...rest}
      isDisabled={disabled}
      isInvalid={Boolean(error)}
      validationBehavior="aria"
      className={clsx(fieldClass, className)}
    >
      <FieldLabel hide={hideLabel} optional={optional}>
        {label}
        {unit != null ? <span className="sr-only"> in {unit}</span> : null}
      </FieldLabel>
      <div className="relative">
        <Input
          ref={ref}
          placeholder={placeholder}
          className={inputClass(
            roomy,
            clsx('read-only:bg-sunk', mono && 'font-mono tabular', unit != null && 'pr-12'),
          )}
        />
        {unit != null ? (
          <span
            aria-hidden
            className="pointer-events-none absolute inset-y-0 right-2.5 flex items-center text-sm text-slate"
          >
            {unit}
          </span>
        ) : null}
      </div>
      <FieldNotes help={help} error={error} />
    </AriaTextField>
  );
}

export interface TextAreaProps extends Shared {
  rows?: number;
  placeholder?: string;
  optional?: boolean;
  ref?: Ref<HTMLTextAreaElement>;
}

export function TextArea(props: TextAreaProps) {
  const {
    label,
    help,
    error,
    disabled,
    roomy,
    hideLabel,
    className,
    rows = 4,
    optional,
    placeholder,
    ref,
    ...rest
  } = props;
  return (
    <AriaTextField
      {...rest}
      isDisabled={disabled}
      isInvalid={Boolean(error)}
      validationBehavior="aria"
      className={clsx(fieldClass, className)}
    >
      <FieldLabel hide={hideLabel} optional={optional}>
        {label}
      </FieldLabel>
      <AriaTextArea
        ref={ref}
        rows={rows}
        placeholder={placeholder}
        className={inputClass(roomy, 'resize-y py-2')}
      />
      <FieldNotes help={help} error={error} />
    </AriaTextField>
  );
}
