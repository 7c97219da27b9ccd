/** What the words need to know of a finding. */
export interface Judged {
  /** `fail`, `caution`, `pass` or `not-run`. */
  status: string;
  /** Whether a lead let it stand. */
  waived: boolean;
}

const counted = (n: number, one: string, many: string) => (n === 1 ? `1 ${one}` : `${n} ${many}`);

/**
 * What a finished check run says altogether, in a sentence. It never promises that the template forms: checks find
 * reasons against it, and those that were not run find none.
 */
export function verdictWords(findings: readonly Judged[]): string {
  const of = (status: string) => findings.filter((finding) => finding.status === status);
  const failing = of('fail');
  const standing = failing.filter((finding) => !finding.waived).length;
  const waived = failing.length - standing;
  const look = of('caution').length;
  const unrun = of('not-run').length;
  const parts = [
    waived > 0 ? `${counted(waived, 'finding fails and is', 'findings fail and are')} waived` : '',
    look > 0 ? counted(look, 'finding wants a look', 'findings want a look') : '',
    unrun > 0 ? `${counted(unrun, 'check was', 'checks were')} not run` : '',
  ].filter(Boolean);
  const head =
    standing > 0
      ? counted(standing, 'finding fails', 'findings fail')
      : waived > 0
        ? parts.shift()!
        : look > 0
          ? 'Nothing that was checked forbids it'
          : of('pass').length === 0
            ? 'Nothing was checked'
            : 'Everything that was checked is within its limits';
  return parts.length > 0 ? `${head}; ${parts.join(', ')}.` : `${head}.`;
}

/** The same in two or three words, for a list: never more than the checks that were run can say. */
export const verdictTag = {
  pass: 'no fault found',
  caution: 'look at findings',
  fail: 'fails a check',
} as const;
