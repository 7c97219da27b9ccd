import { createHash } from 'node:crypto';
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { packagesAreCurrent } from '@/docker/local/setup/npm-packages.mjs';
import { tempFolder } from '../../../support/temp-folder';

const base = tempFolder();
let count = 0;
function checkout(wanted: object, installed: object | null): string {
  const folder = path.join(base, `checkout-${(count += 1)}`);
  mkdirSync(path.join(folder, 'node_modules'), { recursive: true });
  const write = (file: string, packages: object) =>
    writeFileSync(path.join(folder, file), JSON.stringify({ packages: { '': {}, ...packages } }));
  write('package-lock.json', wanted);
  if (installed) write('node_modules/.package-lock.json', installed);
  return folder;
}
const zod = (version: string) => ({ 'node_modules/zod': { version } });

describe('packagesAreCurrent', () => {
  it('holds when every package of the lock file is there in its version', () => {
    expect(packagesAreCurrent(checkout(zod('4.0.0'), zod('4.0.0')))).toBe(true);
  });

  it('does not hold for another version, a missing package, a broken-off install', () => {
    expect(packagesAreCurrent(checkout(zod('4.0.1'), zod('4.0.0')))).toBe(false);
    expect(packagesAreCurrent(checkout(zod('4.0.0'), {}))).toBe(false);
    expect(packagesAreCurrent(checkout(zod('4.0.0'), null))).toBe(false);
  });

  it('does not wait for optional packages of other systems', () => {
    const wanted = { ...zod('4.0.0'), 'node_modules/only-elsewhere': { version: '1.0.0', optional: true } };
    expect(packagesAreCurrent(checkout(wanted, zod('4.0.0')))).toBe(true);
  });

  it('holds after an install from exactly this lock file, whatever npm left out, and not for another', () => {
    const folder = checkout(zod('4.0.0'), {});
    const lock = readFileSync(path.join(folder, 'package-lock.json'));
    const stamp = path.join(folder, 'node_modules/.installed-from');
    writeFileSync(stamp, createHash('sha256').update(lock).digest('hex'));
    expect(packagesAreCurrent(folder)).toBe(true);
    writeFileSync(path.join(folder, 'package-lock.json'), JSON.stringify({ packages: zod('4.0.1') }));
    expect(packagesAreCurrent(folder)).toBe(false);
  });

  it('holds for this checkout, in which the tests run', () => {
    expect(packagesAreCurrent(path.resolve(import.meta.dirname, '../../../..'))).toBe(true);
  });
});
