import { readdirSync } from 'node:fs';
import path from 'node:path';

/** What is known of each test file: its time, and how often it ran and noticed for each file of the engine. */
export type Known = Map<string, { seconds: number; runs: Map<string, number>; kills: Map<string, number> }>;

export function listTests(root: string): string[] {
  return (readdirSync(root, { recursive: true }) as string[])
    .filter((file) => file.endsWith('.test.ts'))
    .sort()
    .map((file) => path.join(root, file));
}

/** Those tests that import a file, the likeliest to notice a change in the least time first. */
export function orderTests(file: string, far: Map<string, number>, known: Known): string[] {
  const cost = (test: string) => {
    const { seconds, runs, kills } = known.get(test)!;
    const near = 0.6 ** (far.get(test) ?? 9);
    const noticed = ((kills.get(file) ?? 0) + near) / ((runs.get(file) ?? 0) + 1);
    return (seconds + 0.05) / noticed;
  };
  return [...far.keys()]
    .filter((test) => known.has(test))
    .map((test) => ({ test, cost: cost(test) }))
    .sort((a, b) => a.cost - b.cost)
    .map(({ test }) => test);
}
