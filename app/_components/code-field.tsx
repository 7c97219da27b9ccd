'use client';

import { TextField, type TextFieldProps } from './text-field';

/** For a rule of react-hook-form: six digits, blanks aside. */
export const sixDigits = (value: string) =>
  /^(\s*\d){6}\s*$/.test(value) || 'Write the six digits that your authenticator shows.';

/** The code of an authenticator; telephones offer their digits for it. */
export function CodeField(props: Omit<TextFieldProps, 'label' | 'type' | 'mono'> & { label?: string }) {
  return (
    <TextField
      label="Code of your authenticator"
      inputMode="numeric"
      autoComplete="one-time-code"
      spellCheck="false"
      maxLength={10}
      mono
      {...props}
    />
  );
}
