const anyOrigin = 'https://self.invalid';

/**
 * A path inside this application, fit to redirect to, or `fallback`. Refuses other origins in every spelling
 * (`//host`, `/\host`, control characters, encoded slashes, dot segments that collapse to `//host`).
 */
export function safePath(candidate: unknown, fallback = '/today'): string {
  if (typeof candidate !== 'string' || candidate.length > 2048) return fallback;
  if (!candidate.startsWith('/') || /[\s\\\u0000-\u001f\u007f-\u009f]/.test(candidate)) return fallback;
  if (/^\/(?:\/|%2f|%5c|%09|%0a|%0d)/i.test(candidate)) return fallback;
  if (!URL.canParse(candidate, anyOrigin)) return fallback;
  const url = new URL(candidate, anyOrigin);
  if (url.origin !== anyOrigin || url.username || url.pathname.startsWith('//')) return fallback;
  return url.pathname + url.search + url.hash;
}
