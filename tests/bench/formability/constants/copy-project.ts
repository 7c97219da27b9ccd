import { cpSync, mkdtempSync, rmSync, symlinkSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';

/** What the engine's tests read: the engine, the tests, and the settings of the compiler. */
const COPIED = ['lib', 'tests', 'package.json', 'tsconfig.json'];

/** A copy of the project in a temporary directory, with the same packages; removed by `remove`. */
export function copyProject(root: string): { copy: string; remove(): void } {
  const copy = mkdtempSync(path.join(tmpdir(), 'constants-'));
  for (const name of COPIED) {
    cpSync(path.join(root, name), path.join(copy, name), {
      recursive: true,
      filter: (from) => !from.includes(`${path.sep}.out`),
    });
  }
  symlinkSync(path.join(root, 'node_modules'), path.join(copy, 'node_modules'), 'dir');
  return { copy, remove: () => rmSync(copy, { recursive: true, force: true }) };
}
