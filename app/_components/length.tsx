'use client';

import { convertLength } from './format-figure';
import { Figure } from './figure';
import { usePreferences } from './preferences-context';

/** A length given in millimetres, shown in the reader's units. `digits` counts decimals in millimetres. */
export function Length(props: { mm: number | null | undefined; digits?: number; className?: string }) {
  const { mm, digits = 2, className } = props;
  const { units } = usePreferences();
  if (mm == null) return <Figure value={null} className={className} />;
  return <Figure {...convertLength(mm, units, digits)} className={className} />;
}
