/** As lib/review/schemas holds it; said here at once, without fetching the schemas into the page. */
export const longestTitle = 80;

/** Nothing is cut: a title that is too long stays as it was pasted, and this sentence stands beside it. */
export function titleTooLong(title: string): string | undefined {
  const length = title.trim().length;
  return length > longestTitle ? `At most ${longestTitle} characters; this has ${length}.` : undefined;
}
