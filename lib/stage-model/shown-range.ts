/** A face between these drafts shows layer lines: an upright one has no step, a flat one lies in a layer (engine contract). */
export const LAYERS_FROM_DEG = 0.25;
export const LAYERS_TO_DEG = 89.5;
/** A pocket shallower than this is surface (engine contract). */
export const TRAP_FROM_MM = 0.05;
