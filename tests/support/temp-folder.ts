import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll } from 'vitest';

/** A folder of this test file's own, gone at its end. */
export function tempFolder(): string {
  const folder = mkdtempSync(path.join(tmpdir(), 'firstpull-unit-'));
  afterAll(() => rmSync(folder, { recursive: true, force: true }));
  return folder;
}
