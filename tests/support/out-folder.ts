import path from 'node:path';

/** Where tests leave reports, logs and pictures; never committed. */
export const outFolder = path.resolve(import.meta.dirname, '../.out');
