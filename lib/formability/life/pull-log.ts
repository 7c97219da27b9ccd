import { UnusableInput } from '../unusable-input';

/** How one template ended: after how many pulls, and whether it failed or was put away still good. */
export interface LoggedTemplate {
  pulls: number;
  failed: boolean;
}

const MOST_TEMPLATES = 10_000;
const MOST_PULLS = 10_000_000;

/** @throws UnusableInput `invalid_recipe` saying which entry of the log cannot be used, and why */
export function readPullLog(given: unknown): LoggedTemplate[] {
  const refuse = (what: string): never => {
    throw new UnusableInput(
      'invalid_recipe',
      `the pull log cannot be used: ${what}. Give a list of {"pulls": a whole number above 0, "failed": true or false}, one a template`,
      [what],
    );
  };
  if (!Array.isArray(given)) return refuse('it is not a list');
  if (given.length === 0) return refuse('it is empty');
  if (given.length > MOST_TEMPLATES)
    return refuse(`it has ${given.length} entries, more than ${MOST_TEMPLATES}`);
  return given.map((entry: unknown, k) => {
    const { pulls, failed } = (
      typeof entry === 'object' && entry !== null ? entry : {}
    ) as Partial<LoggedTemplate>;
    if (!Number.isInteger(pulls) || Number(pulls) < 1 || Number(pulls) > MOST_PULLS)
      return refuse(`entry ${k + 1} ${told('pulls', pulls)}`);
    if (typeof failed !== 'boolean') return refuse(`entry ${k + 1} ${told('failed', failed)}`);
    return { pulls: Number(pulls), failed };
  });
}

function told(field: string, value: unknown): string {
  return value === undefined ? `has no "${field}"` : `has ${field} ${JSON.stringify(value)}`;
}
