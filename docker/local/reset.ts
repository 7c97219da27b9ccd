import { existsSync, readdirSync, rmdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import { createInterface } from 'node:readline/promises';
import { LocalError, outsideClusterFolder, ownEntries } from './folders';
import { readHolder } from './lock';

/**
 * Deletes everything that local runs made on this data folder, after asking.
 * @returns false when the person says no
 * @throws {LocalError} when it runs now, or when there is nobody to ask and `yes` is not set
 */
export async function resetData(dataFolder: string, yes: boolean): Promise<boolean> {
  const running = readHolder(dataFolder);
  if (running) {
    throw new LocalError(
      `Firstpull runs on ${dataFolder} (process ${running.holder.pid}). Stop it first; nothing was deleted.`,
    );
  }
  const outside = outsideClusterFolder(dataFolder);
  const doomed = [
    ...(existsSync(dataFolder) ? readdirSync(dataFolder) : [])
      .filter((name) => ownEntries.some((own) => name.startsWith(own)))
      .map((name) => path.join(dataFolder, name)),
    ...(existsSync(outside) ? [outside] : []),
  ];
  if (doomed.length === 0) return true;
  if (
    !yes &&
    !(await confirm(`Delete all data of this local Firstpull (${dataFolder})? Type "yes" to go on: `))
  ) {
    return false;
  }
  doomed.forEach((one) => rmSync(one, { recursive: true, force: true }));
  if (existsSync(dataFolder) && readdirSync(dataFolder).length === 0) rmdirSync(dataFolder);
  return true;
}

async function confirm(question: string): Promise<boolean> {
  if (!process.stdin.isTTY) {
    throw new LocalError(
      'There is nobody to ask here; nothing was deleted. Add --yes: npm run reset -- --yes',
    );
  }
  const prompt = createInterface({ input: process.stdin, output: process.stdout });
  try {
    return (await prompt.question(question)).trim().toLowerCase() === 'yes';
  } finally {
    prompt.close();
  }
}
