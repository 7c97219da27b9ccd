type Handler = (
  request: Request,
  args: { params: Promise<Record<string, string | string[]>> },
) => Promise<Response>;

export type Call = {
  method?: string;
  /** Path that the request names; matters for idempotency keys and queries. */
  path?: string;
  params?: Record<string, string>;
  cookie?: string;
  body?: unknown;
  /** Fields of a urlencoded body. */
  form?: Record<string, string>;
  headers?: Record<string, string>;
};

/** Calls a route handler as a browser on our own pages would. */
export function callRoute(handler: Handler, call: Call = {}): Promise<Response> {
  const site = process.env.APP_URL!;
  const method = call.method ?? (call.body || call.form ? 'POST' : 'GET');
  const headers = new Headers({ origin: new URL(site).origin, ...call.headers });
  if (call.cookie) headers.set('cookie', call.cookie);
  let body: string | undefined;
  if (call.form) {
    headers.set('content-type', 'application/x-www-form-urlencoded');
    body = new URLSearchParams(call.form).toString();
  } else if (call.body !== undefined) {
    headers.set('content-type', 'application/json');
    body = JSON.stringify(call.body);
  }
  const request = new Request(new URL(call.path ?? '/api/v1/test', site), { method, headers, body });
  return handler(request, { params: Promise.resolve(call.params ?? {}) });
}

/** The cookies of an answer, as the next request sends them. */
export const cookieOf = (answer: Response) =>
  answer.headers
    .getSetCookie()
    .map((cookie) => cookie.split(';')[0])
    .join('; ');
