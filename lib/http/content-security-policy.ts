export type PolicyPlaces = {
  nonce: string;
  /** Origin that presigned addresses lead to, e.g. `https://s3.example.com`. */
  storeOrigin: string;
  /** Origin of the realtime server's sockets, e.g. `wss://live.example.com:443`. */
  realtimeOrigin: string;
  /** Served over https: nothing is fetched in the clear. */
  secure: boolean;
  /** React's development build evaluates strings; the product never does. */
  development: boolean;
};

/**
 * Content-Security-Policy of every page (CSP level 3): scripts by nonce alone, WebAssembly for the mesh decoder,
 * data from this host, the store and the realtime server. Style attributes are let be; they run nothing.
 */
export function contentSecurityPolicy(places: PolicyPlaces): string {
  const { nonce, storeOrigin, realtimeOrigin, secure, development } = places;
  const scripts = ["'self'", `'nonce-${nonce}'`, "'strict-dynamic'", "'wasm-unsafe-eval'"];
  if (development) scripts.push("'unsafe-eval'");
  const directives: [string, ...string[]][] = [
    ['default-src', "'self'"],
    ['script-src', ...scripts],
    ['style-src', "'self'", development ? "'unsafe-inline'" : `'nonce-${nonce}'`],
    ['style-src-attr', "'unsafe-inline'"],
    ['img-src', "'self'", 'data:', 'blob:', storeOrigin],
    ['font-src', "'self'"],
    ['connect-src', "'self'", realtimeOrigin, storeOrigin, ...(development ? ['ws:'] : [])],
    ['worker-src', "'self'", 'blob:'],
    ['object-src', "'none'"],
    ['frame-src', "'none'"],
    ['base-uri', "'none'"],
    ['form-action', "'self'"],
    ['frame-ancestors', "'none'"],
  ];
  if (secure) directives.push(['upgrade-insecure-requests']);
  return directives.map((words) => words.join(' ')).join('; ');
}
