export const EXIT: Record<'done' | 'parentGone' | 'tooSlow' | 'tooMuchMemory' | 'crashed', number>;
