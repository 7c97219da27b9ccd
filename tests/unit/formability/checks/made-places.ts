import type { Point } from '@/lib/formability/report';

/** The k-th of a row of made places. */
export const at = (k: number): Point => [k, 0, 1];

/** As many made things as asked for. */
export const many = <T>(count: number, make: (k: number) => T): T[] =>
  Array.from({ length: count }, (_, k) => make(k));
