import { canonical } from './canonical';

/** Whether two JSON values are the same, whatever the order of their keys; a missing one counts as null. */
export const sameJson = (a: unknown, b: unknown): boolean => canonical(a ?? null) === canonical(b ?? null);
