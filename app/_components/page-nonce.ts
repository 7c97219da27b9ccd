/** The nonce of this document's policy; the browser keeps it from style sheets and foreign scripts. */
export function pageNonce(): string | undefined {
  if (typeof document === 'undefined') return undefined;
  return document.querySelector<HTMLMetaElement>('meta[property="csp-nonce"]')?.nonce || undefined;
}
