/** Two letters for a person: first and last word's first letters, or the first two of a single word. */
export function initialsOf(name: string): string {
  const words = name.trim().split(/\s+/).filter(Boolean);
  if (words.length === 0) return '?';
  const first = [...words[0]];
  const last = [...words[words.length - 1]];
  return (words.length === 1 ? first.slice(0, 2).join('') : first[0] + last[0]).toLocaleUpperCase('en');
}
