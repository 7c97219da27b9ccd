'use client';

import clsx from 'clsx';
import { useState, type Ref } from 'react';
import { Button, Input, TextField } from 'react-aria-components';
import { fieldClass, FieldLabel, FieldNotes, inputClass, type FieldBaseProps } from './field';

export const passwordLimits = { min: 15, max: 128 } as const;

export interface PasswordFieldProps extends FieldBaseProps {
  name?: string;
  value?: string;
  onChange?: (value: string) => void;
  onBlur?: () => void;
  /** `current-password` to sign in or sign a revision, `new-password` to set one; password managers need it. */
  autoComplete: 'current-password' | 'new-password';
  autoFocus?: boolean;
  ref?: Ref<HTMLInputElement>;
}

/** A password that can be pasted, filled by a manager, and shown while it is typed. */
export function PasswordField(props: PasswordFieldProps) {
  const { label, help, error, disabled, roomy, hideLabel, className, ref, ...rest } = props;
  const [shown, setShown] = useState(false);
  return (
    <TextField
      {...rest}
      type={shown ? 'text' : 'password'}
      spellCheck="false"
      isDisabled={disabled}
      isInvalid={Boolean(error)}
      validationBehavior="aria"
      className={clsx(fieldClass, className)}
    >
      <FieldLabel hide={hideLabel}>{label}</FieldLabel>
      <div className="relative">
        <Input ref={ref} autoCapitalize="none" className={inputClass(roomy, 'pr-16')} />
        <Button
          aria-label={shown ? 'Hide the password' : 'Show the password'}
          onPress={() => setShown(!shown)}
          isDisabled={disabled}
          className="absolute inset-y-0 right-0 px-3 text-sm font-medium text-verdigris hover:underline"
        >
          {shown ? 'Hide' : 'Show'}
        </Button>
      </div>
      <FieldNotes help={help} error={error} />
    </TextField>
  );
}
