'use client';

import type { ReactElement } from 'react';
import {
  useController,
  type Control,
  type ControllerRenderProps,
  type FieldPath,
  type FieldValues,
  type RegisterOptions,
} from 'react-hook-form';

export interface ControlledProps<V extends FieldValues, N extends FieldPath<V>> {
  control: Control<V>;
  name: N;
  rules?: Omit<RegisterOptions<V, N>, 'valueAsNumber' | 'valueAsDate' | 'setValueAs' | 'disabled'>;
  /** Spread the argument on any field of ours: `{(field) => <TextField label="Title" {...field} />}`. */
  children: (field: ControllerRenderProps<V, N> & { error?: string }) => ReactElement;
}

/** Ties a field to react-hook-form, its error included. */
export function Controlled<V extends FieldValues, N extends FieldPath<V>>(props: ControlledProps<V, N>) {
  const { control, name, rules, children } = props;
  const { field, fieldState } = useController({ control, name, rules });
  return children({ ...field, error: fieldState.error?.message });
}
