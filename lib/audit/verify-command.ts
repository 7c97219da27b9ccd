import { parseArgs } from 'node:util';
import { closeDatabases } from '@/db/client';
import { listAllWorkspaces } from '@/lib/auth/auth-data';
import { jobContext } from '@/lib/auth/context';
import { readHeads, writeHeads } from './heads-file';
import type { ChainHead } from './verify-chain';
import { verifyWorkspace } from './verify-workspace';

const usage = `npm run audit:verify -- [options]

  Recomputes the audit chain of every workspace and holds every locked revision
  against it. Ends with 0 when all is as it was written, 1 when something is not,
  2 when it could not look.

  --workspace <slug or id>  only this one
  --objects                 also read every agreed mesh and pack in the store
  --heads <file>            write the ends of the chains to a file; keep it elsewhere
  --against <file>          the ends in this file must still be part of the chains
`;

async function main(): Promise<number> {
  const { values } = parseArgs({
    options: {
      workspace: { type: 'string' },
      objects: { type: 'boolean', default: false },
      heads: { type: 'string' },
      against: { type: 'string' },
      help: { type: 'boolean', default: false },
    },
  });
  if (values.help) return say(usage, 0);
  const anchors = values.against ? await readHeads(values.against) : {};
  const all = await listAllWorkspaces();
  const wanted = all.filter(({ id, slug }) => !values.workspace || [id, slug].includes(values.workspace));
  if (values.workspace && wanted.length === 0)
    return say(`There is no workspace ${values.workspace}.\n`, 2, process.stderr);
  const heads: Record<string, ChainHead> = {};
  let faults = 0;
  for (const { id, name, slug } of wanted) {
    const verdict = await verifyWorkspace(jobContext(id), { objects: values.objects, anchor: anchors[id] });
    heads[id] = verdict.head;
    faults += verdict.faults.length;
    const looked = `${verdict.entries} entries, ${verdict.revisions} locked revisions${values.objects ? `, ${verdict.objects} files` : ''}`;
    say(
      `${verdict.faults.length ? 'BAD ' : 'good'}  ${slug}  ${name}: ${looked}, head ${verdict.head.hash}\n`,
      0,
    );
    for (const fault of verdict.faults) say(`        ${fault}\n`, 0);
  }
  for (const id of Object.keys(anchors))
    if (!all.some((one) => one.id === id)) {
      faults += 1;
      say(`BAD   ${id}: the workspace of a remembered head is not there\n`, 0);
    }
  if (values.heads && faults === 0) await writeHeads(values.heads, heads);
  return say(
    faults === 0 ? 'Everything is as it was written.\n' : `${faults} faults found.\n`,
    faults ? 1 : 0,
  );
}

function say(text: string, code: number, stream: NodeJS.WriteStream = process.stdout): number {
  stream.write(text);
  return code;
}

try {
  process.exitCode = await main();
} catch (error) {
  process.exitCode = say(`The audit could not be verified: ${(error as Error).message}\n`, 2, process.stderr);
} finally {
  await closeDatabases();
}
