/** A sentence with a capital at its start; `keep` is a name that stays as it is written, such as a file's. */
export function sentenceCase(text: string, keep?: string): string {
  if (keep && text.startsWith(keep)) return text;
  return text.charAt(0).toUpperCase() + text.slice(1);
}
