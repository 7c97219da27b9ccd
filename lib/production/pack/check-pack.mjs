// Checks a release pack without the product: needs Node 18 or later, no network, no other package.
//   node check-pack.mjs [the signed digest, from the certificate or mail that you were handed]
// Exit 0: all is as it was agreed. Exit 1: something is not; every fault names its file.
import { createHash } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { readFile, readdir } from 'node:fs/promises';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const folder = path.dirname(fileURLToPath(import.meta.url));
const faults = [];
const fault = (name, what) => faults.push(`${name}: ${what}`);

const sha256 = (data) => createHash('sha256').update(data).digest('hex');

async function sumOfFile(name) {
  const hash = createHash('sha256');
  for await (const chunk of createReadStream(path.join(folder, name))) hash.update(chunk);
  return hash.digest('hex');
}

/** RFC 8785: keys in order of their UTF-16 units, numbers and strings as JSON.stringify writes them. */
function canonical(value) {
  if (Array.isArray(value)) return `[${value.map(canonical).join(',')}]`;
  if (value === null || typeof value !== 'object') return JSON.stringify(value);
  const keys = Object.keys(value).sort();
  return `{${keys.map((key) => `${JSON.stringify(key)}:${canonical(value[key])}`).join(',')}}`;
}
const digestOf = (value) => sha256(canonical(value));

async function readJson(name) {
  try {
    return JSON.parse(await readFile(path.join(folder, name), 'utf8'));
  } catch (error) {
    fault(name, error.code === 'ENOENT' ? 'is missing' : 'cannot be read as JSON');
    return null;
  }
}

/** The sums in SHA256SUMS by name; a line that is no sum is a fault. */
async function readSums() {
  const text = await readFile(path.join(folder, 'SHA256SUMS'), 'utf8').catch(() => null);
  if (text === null) fault('SHA256SUMS', 'is missing');
  const sums = new Map();
  for (const line of (text ?? '').split('\n').filter(Boolean)) {
    const [, sum, name] = /^([0-9a-f]{64}) {2}([^/\\]+)$/.exec(line) ?? [];
    if (name) sums.set(name, sum);
    else fault('SHA256SUMS', `has a line that is not a sum: ${line.slice(0, 80)}`);
  }
  return sums;
}

const sums = await readSums();
// What file managers leave in a folder that was looked at.
const leftovers = ['.DS_Store', 'Thumbs.db', 'desktop.ini'];
const names = await readdir(folder);
const found = new Map();
for (const name of names) {
  if (name === 'SHA256SUMS' || leftovers.includes(name)) continue;
  if (!sums.has(name)) fault(name, 'does not belong to the pack (SHA256SUMS does not name it)');
  else found.set(name, await sumOfFile(name));
}
for (const [name, sum] of sums) {
  if (!found.has(name)) fault(name, 'is missing');
  else if (found.get(name) !== sum) fault(name, 'was changed: its SHA-256 is not the one in SHA256SUMS');
}

const content = await readJson('content.json');
const record = await readJson('signatures.json');
const digest = found.get('content.json');
// The page prints the digest in groups of four.
const handed = process.argv.slice(2).join('').toLowerCase();
if (handed && digest && digest !== handed)
  fault('content.json', `has the digest ${digest}, not the one that you were handed`);
if (record && digest && record.contentDigest !== digest)
  fault('content.json', 'is not what was signed: signatures.json names another digest');

for (const one of record?.signatures ?? []) {
  if (!one.content) continue;
  if (!found.has(one.content)) fault(one.content, `is missing; ${one.printedName} signed it`);
  else if (found.get(one.content) !== one.contentDigest)
    fault(one.content, `is not what ${one.printedName} signed: its digest is another one`);
}

if (content) {
  const isMesh = ([, sum]) => sum === content.mesh?.sha256;
  if (![...found].some(isMesh))
    fault(content.mesh?.fileName ?? 'mesh', 'no file of the pack is the mesh that was signed');
  const parts = [
    ['recipe.json', (recipe) => digestOf(recipe) === content.recipeDigest],
    ['report.json', (report) => digestOf(report) === content.report?.sha256],
    ['docket.json', (docket) => digestOf(summaryOf(docket)) === content.docket?.digest],
  ];
  for (const [name, isSigned] of parts) {
    const part = await readJson(name);
    if (part && !holds(isSigned, part))
      fault(name, 'is not what was signed: content.json names another digest');
  }
}

/** A part without the fields that it must have is not what was signed either. */
function holds(isSigned, part) {
  try {
    return isSigned(part);
  } catch {
    return false;
  }
}

/** What of the docket is signed, in the order in which it is signed. */
function summaryOf({ findings, threads }) {
  return {
    findings: findings.map(({ checkId, status, waiver }) => ({
      checkId,
      status,
      waived: waiver ? waiver.reason : null,
    })),
    threads: threads
      .filter(({ afterApproval }) => !afterApproval)
      .map(({ id, mustSettle, state, notes }) => ({
        id,
        mustSettle,
        state,
        notes: notes.length,
        notesDigest: digestOf(
          notes.map((note) => ({ id: note.id, authorId: note.authorId, body: note.body })),
        ),
      }))
      .sort((a, b) => (a.id < b.id ? -1 : 1)),
  };
}

if (faults.length > 0) {
  console.log(`${faults.length === 1 ? 'One fault' : `${faults.length} faults`}:`);
  for (const one of faults) console.log(`  ${one}`);
  process.exitCode = 1;
} else {
  console.log(`All ${found.size} files are as they were packed.`);
  console.log(`Mesh, recipe, report and docket are those that were signed under the digest\n  ${digest}`);
  if (!handed)
    console.log(
      'Compare it with the digest on the certificate or in the mail that you were handed, or give it:\n' +
        '  node check-pack.mjs <digest>',
    );
}
