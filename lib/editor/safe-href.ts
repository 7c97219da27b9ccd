const allowed = new Set(['http:', 'https:', 'mailto:']);

/** The address as a note may carry it, or null: http, https and mailto only, with a host, without a password. */
export function safeHref(candidate: unknown): string | null {
  if (typeof candidate !== 'string' || candidate.length > 2000) return null;
  let url: URL;
  try {
    url = new URL(candidate);
  } catch {
    return null;
  }
  if (!allowed.has(url.protocol)) return null;
  if (url.protocol !== 'mailto:' && url.hostname === '') return null;
  if (url.username || url.password) return null;
  return url.href;
}
