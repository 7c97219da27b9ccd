import pino from 'pino';
import { commonEnv } from '@/lib/env/env';

let root: pino.Logger | undefined;

/** Structured log: one JSON line an event. Secrets are never passed in; these paths are cut as a second net. */
export function log(): pino.Logger {
  root ??= pino({
    level: commonEnv().LOG_LEVEL,
    base: undefined,
    timestamp: pino.stdTimeFunctions.isoTime,
    formatters: { level: (label) => ({ level: label }) },
    redact: ['*.password', '*.token', '*.cookie', '*.authorization', '*.secret'],
  });
  return root;
}
