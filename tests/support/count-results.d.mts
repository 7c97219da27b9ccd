export function countVitest(
  reportFile: string,
  exitCode: number,
): { passed: number; failed: number; problems: string[] };
