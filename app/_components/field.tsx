'use client';

import clsx from 'clsx';
import type { ReactNode } from 'react';
import { FieldError, Label, Text } from 'react-aria-components';

/** What every field takes; `disabled` and `ref` let `{...field}` of react-hook-form's Controller be spread. */
export interface FieldBaseProps {
  label: ReactNode;
  /** One plain sentence below the label's control. */
  help?: ReactNode;
  /** What is wrong and what to do; its presence marks the field invalid. */
  error?: string;
  isRequired?: boolean;
  disabled?: boolean;
  /** Targets of at least 44 px. */
  roomy?: boolean;
  /** Keeps the label for screen readers only. */
  hideLabel?: boolean;
  className?: string;
}

export const fieldClass = 'group/field flex min-w-0 flex-col gap-1';

/** Classes of a text-like control. 16 px on small screens keeps phones from zooming in. */
export function inputClass(roomy?: boolean, extra?: string): string {
  return clsx(
    'w-full min-w-0 border border-edge bg-sheet px-2.5 text-md text-ink sm:text-base',
    'placeholder:text-slate hover:border-ink data-invalid:border-madder data-invalid:border-l-4',
    'data-disabled:border-rule data-disabled:bg-sunk data-disabled:text-slate',
    roomy ? 'min-h-12' : 'min-h-9 pointer-coarse:min-h-11',
    extra,
  );
}

export function FieldLabel(props: { children: ReactNode; hide?: boolean; optional?: boolean }) {
  return (
    <Label className={props.hide ? 'sr-only' : 'text-sm font-semibold text-ink'}>
      {props.children}
      {props.optional ? <span className="font-normal text-slate"> (optional)</span> : null}
    </Label>
  );
}

export function FieldNotes({ help, error }: Pick<FieldBaseProps, 'help' | 'error'>) {
  return (
    <>
      {help ? (
        <Text slot="description" className="text-sm text-slate">
          {help}
        </Text>
      ) : null}
      <FieldError className="flex gap-1.5 text-sm font-medium text-madder">
        <span aria-hidden>▲</span>
        <span>{error}</span>
      </FieldError>
    </>
  );
}
