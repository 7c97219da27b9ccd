import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { isRoot, openDataFolder } from '@/docker/local/folders';
import { lockDataFolder } from '@/docker/local/lock';
import { resetData } from '@/docker/local/reset';
import { openSecrets } from '@/docker/local/secrets';
import { tempFolder } from '../../../support/temp-folder';

const base = tempFolder();
const modeOf = (file: string) => (statSync(file).mode & 0o777).toString(8);

describe('the data folder', () => {
  it('shows its contents to nobody else', () => {
    const data = openDataFolder(path.join(base, 'closed'));
    // As root the database runs as another account, which must pass through but cannot list.
    expect(modeOf(data)).toBe(isRoot() ? '711' : '700');
    expect(['logs', 'store', 'mail'].map((name) => modeOf(path.join(data, name)))).toEqual([
      '700',
      '700',
      '700',
    ]);
  });

  it('keeps secrets that only its owner may read, and the same at every start', () => {
    const data = openDataFolder(path.join(base, 'secrets'));
    const first = openSecrets(data);
    expect(modeOf(path.join(data, 'secrets.json'))).toBe('600');
    expect(openSecrets(data)).toEqual(first);
    const other = openSecrets(openDataFolder(path.join(base, 'other')));
    expect(other.session).not.toBe(first.session);
    expect(new Set([...Object.values(first.databaseRoles), first.session, first.databaseAdmin]).size).toBe(6);
  });

  it('says what to do about secrets that are broken', () => {
    const data = openDataFolder(path.join(base, 'broken'));
    writeFileSync(path.join(data, 'secrets.json'), '{}');
    expect(() => openSecrets(data)).toThrow('npm run reset');
  });

  it('refuses a folder that holds other things, and leaves it as it is', () => {
    const folder = path.join(base, 'photos');
    mkdirSync(folder, { mode: 0o755 });
    writeFileSync(path.join(folder, 'holiday.jpg'), '');
    expect(() => openDataFolder(folder)).toThrow('holds other things (holiday.jpg)');
    expect([modeOf(folder), readdirSync(folder)]).toEqual(['755', ['holiday.jpg']]);
  });
});

describe('a reset', () => {
  it('deletes what local runs made, and nothing else', async () => {
    const data = openDataFolder(path.join(base, 'full'));
    openSecrets(data);
    writeFileSync(path.join(data, 'store', 'mesh'), 'x');
    writeFileSync(path.join(data, 'notes.txt'), 'mine');
    expect(await resetData(data, true)).toBe(true);
    expect(readdirSync(data)).toEqual(['notes.txt']);
  });

  it('deletes nothing while it runs', async () => {
    const data = openDataFolder(path.join(base, 'running'));
    openSecrets(data);
    const lock = await lockDataFolder(data, () => undefined);
    await expect(resetData(data, true)).rejects.toThrow('Stop it first; nothing was deleted.');
    expect(existsSync(path.join(data, 'secrets.json'))).toBe(true);
    lock.release();
  });

  it('deletes nothing unasked when there is nobody to ask', async () => {
    const data = openDataFolder(path.join(base, 'unasked'));
    openSecrets(data);
    const before = readFileSync(path.join(data, 'secrets.json'), 'utf8');
    await expect(resetData(data, false)).rejects.toThrow('--yes');
    expect(readFileSync(path.join(data, 'secrets.json'), 'utf8')).toBe(before);
  });
});
