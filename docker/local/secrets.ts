import { randomBytes } from 'node:crypto';
import { chmodSync, existsSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { z } from 'zod';
import { LocalError } from './folders';

const text = z.string().min(16);
const shape = z.object({
  databaseAdmin: text,
  databaseRoles: z.object({
    firstpull_owner: text,
    firstpull_app: text,
    firstpull_auth: text,
    firstpull_relay: text,
  }),
  session: z.string().min(32),
  store: z.object({ accessKeyId: text, secretAccessKey: text }),
  realtime: z.object({ key: text, secret: text }),
});
export type Secrets = z.infer<typeof shape>;

const random = (bytes = 24) => randomBytes(bytes).toString('base64url');

export function makeSecrets(): Secrets {
  return {
    databaseAdmin: random(),
    databaseRoles: {
      firstpull_owner: random(),
      firstpull_app: random(),
      firstpull_auth: random(),
      firstpull_relay: random(),
    },
    session: random(48),
    store: { accessKeyId: `FP${randomBytes(9).toString('hex').toUpperCase()}`, secretAccessKey: random(32) },
    realtime: { key: randomBytes(12).toString('hex'), secret: random(32) },
  };
}

/** Reads the secrets of this data folder, or makes them at the first start; only the owner may read them. */
export function openSecrets(dataFolder: string): Secrets {
  const file = path.join(dataFolder, 'secrets.json');
  if (!existsSync(file)) {
    writeOwnerOnly(file, makeSecrets());
  }
  chmodSync(file, 0o600);
  const parsed = shape.safeParse(JSON.parse(readFileSync(file, 'utf8')));
  if (parsed.success) return parsed.data;
  throw new LocalError(
    `${file} is not complete. Put back a copy of it, or run "npm run reset" to start afresh (this deletes the data).`,
  );
}

/** Writes JSON that only its owner may read, whole or not at all. */
export function writeOwnerOnly(file: string, value: unknown): void {
  const draft = `${file}.${process.pid}.new`;
  writeFileSync(draft, `${JSON.stringify(value, null, 2)}\n`, { mode: 0o600 });
  renameSync(draft, file);
}
