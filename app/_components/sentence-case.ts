/** Words with a capital at their start; `keep` is a name that stays as it is written, such as a file's. */
export function sentenceCase(text: string, keep?: string): string {
  if (keep && text.startsWith(keep)) return text;
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** The same, closed with a full stop where it has no end of its own. */
export function asSentence(text: string, keep?: string): string {
  const words = sentenceCase(text.trim(), keep);
  return /[.!?…]$/.test(words) ? words : `${words}.`;
}
