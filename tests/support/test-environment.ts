/** Sets variables before the code under test first reads them; lib/env remembers what it read. */
export function setEnvironment(variables: Record<string, string>): void {
  Object.assign(process.env, variables);
}
