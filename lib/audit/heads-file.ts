import { readFile, writeFile } from 'node:fs/promises';
import { z } from 'zod';
import type { ChainHead } from './verify-chain';

/** Ends of the chains at one moment, kept outside the database: what a later run compares with. */
const headsFile = z.object({
  schema: z.literal(1),
  takenAt: z.iso.datetime(),
  heads: z.record(
    z.uuid(),
    z.object({ seq: z.number().int().min(0), hash: z.string().regex(/^[0-9a-f]{64}$/) }),
  ),
});

export async function writeHeads(path: string, heads: Record<string, ChainHead>): Promise<void> {
  const content = { schema: 1, takenAt: new Date().toISOString(), heads };
  await writeFile(path, `${JSON.stringify(content, null, 2)}\n`, { mode: 0o600 });
}

/** @throws an Error that says what is wrong with the file */
export async function readHeads(path: string): Promise<Record<string, ChainHead>> {
  const parsed = headsFile.safeParse(JSON.parse(await readFile(path, 'utf8')));
  if (!parsed.success) throw new Error(`${path} is not a file of chain heads as --heads writes it`);
  return parsed.data.heads;
}
