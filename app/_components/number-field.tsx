'use client';

import { useState, type KeyboardEvent, type Ref } from 'react';
import { parseNumber } from './parse-number';
import { TextField } from './text-field';
import type { FieldBaseProps } from './field';

export interface NumberFieldProps extends FieldBaseProps {
  name?: string;
  value: number | null | undefined;
  /** Called with null when the text is empty or cannot be read; the field then says why. */
  onChange: (value: number | null) => void;
  onBlur?: () => void;
  /** Unit shown in the control and read with the label. */
  unit?: string;
  min?: number;
  max?: number;
  /** Step of the arrow keys. */
  step?: number;
  optional?: boolean;
  ref?: Ref<HTMLInputElement>;
}

const write = (value: number | null | undefined) =>
  value == null || Number.isNaN(value) ? '' : String(value);

/** A decimal with a unit. Takes point or comma, steps with the arrow keys, and never turns `0,8` into 8. */
export function NumberField(props: NumberFieldProps) {
  const { value, onChange, onBlur, unit, min, max, step = 1, error, ...rest } = props;
  const [text, setText] = useState(write(value));
  const [seen, setSeen] = useState(value ?? null);
  const parsed = parseNumber(text);

  // A value that came from outside (a default, a reset) replaces the text; our own echo does not.
  if ((value ?? null) !== seen) {
    setSeen(value ?? null);
    if (!parsed.ok || parsed.value !== (value ?? null)) setText(write(value));
  }

  function take(next: string) {
    setText(next);
    const result = parseNumber(next);
    const number = result.ok ? result.value : null;
    setSeen(number);
    onChange(number);
  }

  function stepBy(event: KeyboardEvent) {
    const direction = event.key === 'ArrowUp' ? 1 : event.key === 'ArrowDown' ? -1 : 0;
    if (!direction || rest.disabled) return;
    event.preventDefault();
    const base = parsed.ok && parsed.value !== null ? parsed.value : (min ?? 0);
    const decimals = Math.max(decimalsOf(step), decimalsOf(base));
    const moved = Number((base + direction * step).toFixed(decimals));
    take(write(Math.min(max ?? Infinity, Math.max(min ?? -Infinity, moved))));
  }

  return (
    <div onKeyDown={stepBy} className={rest.className}>
      <TextField
        {...rest}
        className={undefined}
        value={text}
        onChange={take}
        onBlur={onBlur}
        unit={unit}
        mono
        inputMode="decimal"
        autoComplete="off"
        error={parsed.ok ? (error ?? rangeProblem(parsed.value, min, max, unit)) : parsed.problem}
      />
    </div>
  );
}

function decimalsOf(value: number): number {
  return String(value).split('.')[1]?.length ?? 0;
}

function rangeProblem(value: number | null, min?: number, max?: number, unit = ''): string | undefined {
  if (value === null) return undefined;
  if (min !== undefined && value < min) return `At least ${min}${unit && ` ${unit}`}.`;
  if (max !== undefined && value > max) return `At most ${max}${unit && ` ${unit}`}.`;
  return undefined;
}
