import type { z } from 'zod';

/** One verb of the HTTP API as its description names it. `path` is that of the route's folder, `{part}` for `[part]`. */
export type Operation = {
  method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  path: string;
  summary: string;
  /** Nobody has to be signed in: the path holds a mailed token. */
  open?: boolean;
  query?: z.ZodObject;
  body?: z.ZodType;
  /** The body is urlencoded, as Pusher clients send it. */
  form?: boolean;
  answer?: z.ZodType;
  status?: number;
  /** Takes an Idempotency-Key. */
  idempotent?: boolean;
  /** Takes the version that is changed in If-Match, and answers with an ETag. */
  versioned?: boolean;
};
