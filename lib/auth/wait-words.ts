/** `40 seconds`, `3 minutes`: how long somebody has to wait, never too short. */
export function waitWords(seconds: number): string {
  if (seconds <= 1) return 'a second';
  if (seconds <= 90) return `${seconds} seconds`;
  return `${Math.ceil(seconds / 60)} minutes`;
}
