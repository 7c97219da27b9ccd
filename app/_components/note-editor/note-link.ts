import { safeHref } from '@/lib/editor/safe-href';

/** What a person typed as a link: `example.org/a` and `a@b.example` are completed, anything unsafe is null. */
export function hrefFromTyping(typed: string): string | null {
  const text = typed.trim();
  if (text === '') return null;
  const complete = safeHref(text);
  if (complete) return complete;
  if (/^[^\s@/:]+@[^\s@/:]+\.[^\s@/:]+$/.test(text)) return safeHref(`mailto:${text}`);
  const hasScheme = /^[a-z][a-z0-9+.-]*:/i.test(text) && !/^[a-z0-9.-]+\.[a-z]{2,}:\d+/i.test(text);
  if (hasScheme) return null;
  return /^[^\s/@]+\.[^\s/@]{2,}/.test(text) ? safeHref(`https://${text}`) : null;
}
