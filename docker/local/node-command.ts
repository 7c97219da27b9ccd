import { createRequire } from 'node:module';
import { pathToFileURL } from 'node:url';

const require = createRequire(import.meta.url);

/** Runs a TypeScript file of ours as a process of its own, without a shell or npm between. */
export function typescriptCommand(file: string, ...args: string[]): [string, ...string[]] {
  return [process.execPath, '--import', pathToFileURL(require.resolve('tsx/esm')).href, file, ...args];
}
